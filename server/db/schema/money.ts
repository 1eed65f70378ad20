import { sql } from 'drizzle-orm';
import { check, foreignKey, integer, primaryKey, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { centsColumn, dayColumn, flagColumn, isDay, isDecimal, isFlag, whColumn } from './columns.ts';
import { households } from './households.ts';
import { documents } from './papers.ts';

const householdId = () =>
  text('household_id')
    .notNull()
    .references(() => households.id, { onDelete: 'cascade' });

/** A plan is one validated JSON value: its language grows without a column each. */
export const ratePlans = sqliteTable(
  'rate_plans',
  {
    householdId: householdId(),
    fromDay: dayColumn('from_day').notNull(),
    plan: text('plan').notNull(),
    withoutRoof: text('without_roof'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.fromDay] }),
    check('rate_plans_from', isDay(table.fromDay)),
    check('rate_plans_json', sql`json_valid(${table.plan})`),
    check('rate_plans_without', sql`${table.withoutRoof} IS NULL OR json_valid(${table.withoutRoof})`),
  ],
);

export const loans = sqliteTable(
  'loans',
  {
    householdId: householdId().primaryKey(),
    lender: text('lender').notNull(),
    principalCents: centsColumn('principal_cents').notNull(),
    dealerFeeCents: centsColumn('dealer_fee_cents').notNull(),
    annualRate: text('annual_rate').notNull(),
    termMonths: integer('term_months').notNull(),
    fundedOn: dayColumn('funded_on').notNull(),
    firstPaymentOn: dayColumn('first_payment_on').notNull(),
    /** The rest of the contract, statement balances and refinances: validated JSON. */
    more: text('more').notNull().default('{}'),
  },
  (table) => [
    check('loans_amounts', sql`${table.principalCents} >= 1 AND ${table.dealerFeeCents} >= 0`),
    check('loans_rate', isDecimal(table.annualRate)),
    check('loans_term', sql`${table.termMonths} BETWEEN 1 AND 480`),
    check('loans_days', sql`${isDay(table.fundedOn)} AND ${isDay(table.firstPaymentOn)}`),
  ],
);

/** Kept when the loan's own terms are taken away and entered again. */
export const loanPayments = sqliteTable(
  'loan_payments',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    on: dayColumn('on_day').notNull(),
    amountCents: centsColumn('amount_cents').notNull(),
    extraPrincipalCents: centsColumn('extra_principal_cents').notNull(),
    note: text('note'),
    reamortize: flagColumn('reamortize').notNull().default(false),
    documentId: text('document_id'),
  },
  (table) => [primaryKey({ columns: [table.householdId, table.id] }), check('loan_payments_on', isDay(table.on))],
);

export const mortgages = sqliteTable(
  'mortgages',
  {
    householdId: householdId().primaryKey(),
    lender: text('lender').notNull(),
    kind: text('kind', { enum: ['conventional', 'fha', 'va'] }).notNull(),
    principalCents: centsColumn('principal_cents').notNull(),
    annualRate: text('annual_rate').notNull(),
    termMonths: integer('term_months').notNull(),
    firstPaymentOn: dayColumn('first_payment_on').notNull(),
    originalValueCents: centsColumn('original_value_cents').notNull(),
    extraPrincipalMonthlyCents: centsColumn('extra_principal_monthly_cents').notNull(),
    endedOn: dayColumn('ended_on'),
    /** Null where there is no mortgage insurance; then the rest below is null too. */
    premiumMonthlyCents: centsColumn('premium_monthly_cents'),
    removedOn: dayColumn('removed_on'),
    becauseOfRoof: flagColumn('because_of_roof'),
    endRule: text('end_rule', { enum: ['prudent', 'request80', 'automatic78', 'midpoint', 'appreciation'] }),
    appreciationOn: dayColumn('appreciation_on'),
    /** Appraisals, later premiums, statement balances and what the request rests on: validated JSON. */
    more: text('more').notNull().default('{}'),
  },
  (table) => [
    check('mortgages_kind', sql`${table.kind} IN ('conventional', 'fha', 'va')`),
    check(
      'mortgages_amounts',
      sql`${table.principalCents} >= 1 AND ${table.originalValueCents} >= 1 AND ${table.extraPrincipalMonthlyCents} >= 0 AND (${table.premiumMonthlyCents} IS NULL OR ${table.premiumMonthlyCents} >= 1)`,
    ),
    check('mortgages_rate', isDecimal(table.annualRate)),
    check('mortgages_term', sql`${table.termMonths} BETWEEN 1 AND 480`),
    check('mortgages_first', isDay(table.firstPaymentOn)),
    check('mortgages_ended', isDay(table.endedOn)),
    check('mortgages_removed', isDay(table.removedOn)),
    check('mortgages_appreciation', isDay(table.appreciationOn)),
    check(
      'mortgages_insurance',
      sql`(${table.premiumMonthlyCents} IS NULL) = (${table.endRule} IS NULL) AND (${table.premiumMonthlyCents} IS NULL) = (${table.becauseOfRoof} IS NULL)`,
    ),
  ],
);

export const taxCredits = sqliteTable(
  'tax_credits',
  {
    householdId: householdId().primaryKey(),
    placedInServiceOn: dayColumn('placed_in_service_on'),
    homeShare: text('home_share').notNull(),
    /** Line 16 of a return before the record, as validated JSON; null where there is none. */
    carriedIn: text('carried_in'),
  },
  (table) => [
    check('tax_credits_placed', isDay(table.placedInServiceOn)),
    check('tax_credits_share', isDecimal(table.homeShare)),
  ],
);

export const creditCosts = sqliteTable(
  'credit_costs',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    ordinal: integer('ordinal').notNull(),
    label: text('label').notNull(),
    amountCents: centsColumn('amount_cents').notNull(),
    treatment: text('treatment', { enum: ['qualified', 'reduction', 'leftOut'] }).notNull(),
    reason: text('reason'),
    placedInServiceOn: dayColumn('placed_in_service_on'),
    documentId: text('document_id'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.id] }),
    check('credit_costs_amount', sql`${table.amountCents} >= 0`),
    check('credit_costs_treatment', sql`${table.treatment} IN ('qualified', 'reduction', 'leftOut')`),
  ],
);

export const creditYears = sqliteTable(
  'credit_years',
  {
    householdId: householdId(),
    taxYear: integer('tax_year').notNull(),
    limitCents: centsColumn('limit_cents'),
    status: text('status', { enum: ['planned', 'filed', 'amended'] }).notNull(),
    filedOn: dayColumn('filed_on'),
    refundOn: dayColumn('refund_on'),
    asRefund: flagColumn('as_refund').notNull(),
    typedBy: text('typed_by'),
    limitFrom: text('limit_from'),
    documentId: text('document_id'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.taxYear] }),
    check('credit_years_year', sql`${table.taxYear} BETWEEN 2006 AND 2100`),
    check('credit_years_limit', sql`${table.limitCents} >= 0`),
    check('credit_years_status', sql`${table.status} IN ('planned', 'filed', 'amended')`),
    check('credit_years_filed', isDay(table.filedOn)),
    check('credit_years_refund', isDay(table.refundOn)),
    check('credit_years_as_refund', isFlag(table.asRefund)),
  ],
);

export const incentives = sqliteTable(
  'incentives',
  {
    householdId: householdId().primaryKey(),
    payer: text('payer').notNull(),
    ratePerKwh: text('rate_per_kwh').notNull(),
    firstDay: dayColumn('first_day').notNull(),
    lastDay: dayColumn('last_day').notNull(),
    paidAs: text('paid_as', { enum: ['separate', 'billCredit'] }).notNull(),
  },
  (table) => [
    check('incentives_rate', isDecimal(table.ratePerKwh)),
    check('incentives_days', sql`${isDay(table.firstDay)} AND ${isDay(table.lastDay)}`),
    check('incentives_paid_as', sql`${table.paidAs} IN ('separate', 'billCredit')`),
  ],
);

export const incentiveReceipts = sqliteTable(
  'incentive_receipts',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    on: dayColumn('on_day').notNull(),
    amountCents: centsColumn('amount_cents').notNull(),
    note: text('note'),
    from: dayColumn('from_day'),
    to: dayColumn('to_day'),
    quantityWh: whColumn('quantity_wh'),
    documentId: text('document_id'),
  },
  (table) => [primaryKey({ columns: [table.householdId, table.id] }), check('incentive_receipts_on', isDay(table.on))],
);

export const costs = sqliteTable(
  'costs',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    on: dayColumn('on_day').notNull(),
    kind: text('kind').notNull(),
    label: text('label').notNull(),
    amountCents: centsColumn('amount_cents').notNull(),
    documentId: text('document_id'),
    every: text('every', { enum: ['month', 'quarter', 'year'] }),
    until: dayColumn('until_day'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.id] }),
    foreignKey({
      columns: [table.householdId, table.documentId],
      foreignColumns: [documents.householdId, documents.id],
    }),
    check('costs_on', isDay(table.on)),
  ],
);

/** Solar money from elsewhere, each with its loan as one validated JSON value. */
export const otherLoans = sqliteTable(
  'other_loans',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    ordinal: integer('ordinal').notNull(),
    value: text('value').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.id] }),
    check('other_loans_json', sql`json_valid(${table.value})`),
  ],
);

/** A lease or power-purchase agreement as one validated JSON value. */
export const leases = sqliteTable(
  'leases',
  { householdId: householdId().primaryKey(), value: text('value').notNull() },
  (table) => [check('leases_json', sql`json_valid(${table.value})`)],
);

/** A change tried and kept by name: its levers as one validated JSON value. */
export const scenarios = sqliteTable(
  'scenarios',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    ordinal: integer('ordinal').notNull(),
    value: text('value').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.id] }),
    check('scenarios_json', sql`json_valid(${table.value})`),
  ],
);
