import { sql } from 'drizzle-orm';
import {
  blob,
  check,
  foreignKey,
  index,
  integer,
  primaryKey,
  sqliteTable,
  text,
  unique,
} from 'drizzle-orm/sqlite-core';
import { centsColumn, dayColumn, flagColumn, isDay, isDecimal, isFlag, whColumn } from './columns.ts';
import { households } from './households.ts';

const householdId = () =>
  text('household_id')
    .notNull()
    .references(() => households.id, { onDelete: 'cascade' });

/** A file as it came. `held`: uploaded into a draft and not a fact yet. */
export const documents = sqliteTable(
  'documents',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    /** Order of arrival. */
    ordinal: integer('ordinal').notNull(),
    state: text('state', { enum: ['held', 'kept'] }).notNull(),
    kind: text('kind', { enum: ['statement', 'production', 'credit', 'other'] }).notNull(),
    fileName: text('file_name').notNull(),
    sha256: text('sha256').notNull(),
    size: integer('size').notNull(),
    uploadedOn: dayColumn('uploaded_on').notNull(),
    uploadedBy: text('uploaded_by').notNull(),
    bytes: blob('bytes', { mode: 'buffer' }).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.id] }),
    unique('documents_sha256').on(table.householdId, table.sha256),
    check('documents_state', sql`${table.state} IN ('held', 'kept')`),
    check('documents_kind', sql`${table.kind} IN ('statement', 'production', 'credit', 'other')`),
    check('documents_hash', sql`length(${table.sha256}) = 64 AND ${table.sha256} NOT GLOB '*[^0-9a-f]*'`),
    check('documents_size', sql`${table.size} = length(${table.bytes})`),
    check('documents_uploaded_on', isDay(table.uploadedOn)),
  ],
);

/** One revision of a statement; the highest is in force. */
export const statements = sqliteTable(
  'statements',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    revision: integer('revision').notNull(),
    fromDay: dayColumn('from_day').notNull(),
    toDay: dayColumn('to_day').notNull(),
    printedDays: integer('printed_days'),
    statementOn: dayColumn('statement_on'),
    dueOn: dayColumn('due_on'),
    importWh: whColumn('import_wh'),
    exportWh: whColumn('export_wh'),
    productionWh: whColumn('production_wh'),
    previousBalanceCents: centsColumn('previous_balance_cents'),
    paymentsCents: centsColumn('payments_cents'),
    amountDueCents: centsColumn('amount_due_cents').notNull(),
    /** Budget billing: all null where the bill is not on a budget plan, else at least the instalment. */
    budgetCents: centsColumn('budget_cents'),
    budgetBalanceCents: centsColumn('budget_balance_cents'),
    budgetSettledCents: centsColumn('budget_settled_cents'),
    sourceKind: text('source_kind', { enum: ['file', 'typed'] }).notNull(),
    documentId: text('document_id'),
    fileName: text('file_name'),
    firstRow: integer('first_row'),
    lastRow: integer('last_row'),
    typedBy: text('typed_by'),
    typedOn: dayColumn('typed_on'),
    reason: text('reason'),
    enteredBy: text('entered_by').notNull(),
    enteredAt: text('entered_at').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.id, table.revision] }),
    index('statements_days').on(table.householdId, table.toDay),
    foreignKey({
      columns: [table.householdId, table.documentId],
      foreignColumns: [documents.householdId, documents.id],
    }),
    check('statements_revision', sql`${table.revision} >= 1`),
    check(
      'statements_days',
      sql`${isDay(table.fromDay)} AND ${isDay(table.toDay)} AND ${table.fromDay} < ${table.toDay}`,
    ),
    check(
      'statements_dates',
      sql`(${table.statementOn} IS NULL OR ${isDay(table.statementOn)}) AND (${table.dueOn} IS NULL OR ${isDay(table.dueOn)}) AND (${table.typedOn} IS NULL OR ${isDay(table.typedOn)})`,
    ),
    check(
      'statements_source',
      sql`(${table.sourceKind} = 'file' AND ${table.documentId} IS NOT NULL AND ${table.fileName} IS NOT NULL AND ${table.firstRow} IS NOT NULL AND ${table.lastRow} IS NOT NULL AND ${table.typedBy} IS NULL) OR (${table.sourceKind} = 'typed' AND ${table.documentId} IS NULL AND ${table.typedBy} IS NOT NULL AND ${table.typedOn} IS NOT NULL)`,
    ),
  ],
);

export const statementReads = sqliteTable(
  'statement_reads',
  {
    householdId: householdId(),
    statementId: text('statement_id').notNull(),
    revision: integer('revision').notNull(),
    ordinal: integer('ordinal').notNull(),
    meter: text('meter').notNull(),
    channel: text('channel', { enum: ['import', 'export', 'production'] }).notNull(),
    fromDay: dayColumn('from_day').notNull(),
    toDay: dayColumn('to_day').notNull(),
    previous: text('previous').notNull(),
    current: text('current').notNull(),
    dials: integer('dials').notNull(),
    multiplier: text('multiplier').notNull(),
    type: text('type', { enum: ['actual', 'estimated'] }).notNull(),
    row: integer('row'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.statementId, table.revision, table.ordinal] }),
    foreignKey({
      columns: [table.householdId, table.statementId, table.revision],
      foreignColumns: [statements.householdId, statements.id, statements.revision],
    }).onDelete('cascade'),
    check('statement_reads_channel', sql`${table.channel} IN ('import', 'export', 'production')`),
    check('statement_reads_type', sql`${table.type} IN ('actual', 'estimated')`),
    check('statement_reads_days', sql`${isDay(table.fromDay)} AND ${isDay(table.toDay)}`),
    check('statement_reads_dials', sql`${table.dials} BETWEEN 3 AND 9`),
    check(
      'statement_reads_values',
      sql`${isDecimal(table.previous)} AND ${isDecimal(table.current)} AND ${isDecimal(table.multiplier)}`,
    ),
  ],
);

export const statementLines = sqliteTable(
  'statement_lines',
  {
    householdId: householdId(),
    statementId: text('statement_id').notNull(),
    revision: integer('revision').notNull(),
    ordinal: integer('ordinal').notNull(),
    component: text('component'),
    kind: text('kind').notNull(),
    label: text('label').notNull(),
    quantity: text('quantity'),
    unit: text('unit'),
    rate: text('rate'),
    amountCents: centsColumn('amount_cents').notNull(),
    inDue: flagColumn('in_due').notNull(),
    row: integer('row'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.statementId, table.revision, table.ordinal] }),
    foreignKey({
      columns: [table.householdId, table.statementId, table.revision],
      foreignColumns: [statements.householdId, statements.id, statements.revision],
    }).onDelete('cascade'),
    check('statement_lines_in_due', isFlag(table.inDue)),
    check('statement_lines_quantity', sql`${isDecimal(table.quantity)}`),
    check('statement_lines_rate', sql`${isDecimal(table.rate)}`),
  ],
);

export const statementBanks = sqliteTable(
  'statement_banks',
  {
    householdId: householdId(),
    statementId: text('statement_id').notNull(),
    revision: integer('revision').notNull(),
    ordinal: integer('ordinal').notNull(),
    bank: text('bank').notNull(),
    unit: text('unit', { enum: ['kWh', 'USD'] }).notNull(),
    open: text('open'),
    close: text('close'),
    sentOut: text('sent_out'),
    sentValueCents: centsColumn('sent_value_cents'),
    row: integer('row'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.statementId, table.revision, table.ordinal] }),
    foreignKey({
      columns: [table.householdId, table.statementId, table.revision],
      foreignColumns: [statements.householdId, statements.id, statements.revision],
    }).onDelete('cascade'),
    check('statement_banks_unit', sql`${table.unit} IN ('kWh', 'USD')`),
    check('statement_banks_open', sql`${isDecimal(table.open)}`),
    check('statement_banks_close', sql`${isDecimal(table.close)}`),
  ],
);

/** A channel's local day, packed: little-endian 32-bit Wh, one per step (see `packed-day.ts`). */
export const intervalDays = sqliteTable(
  'interval_days',
  {
    householdId: householdId(),
    channel: text('channel', { enum: ['production', 'monitor', 'import', 'export'] }).notNull(),
    day: dayColumn('day').notNull(),
    minutes: integer('minutes').notNull(),
    steps: blob('steps', { mode: 'buffer' }).notNull(),
    documentId: text('document_id'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.channel, table.day] }),
    foreignKey({
      columns: [table.householdId, table.documentId],
      foreignColumns: [documents.householdId, documents.id],
    }),
    check('interval_days_channel', sql`${table.channel} IN ('production', 'monitor', 'import', 'export')`),
    check('interval_days_day', isDay(table.day)),
    check('interval_days_minutes', sql`${table.minutes} BETWEEN 1 AND 1440`),
    check('interval_days_steps', sql`length(${table.steps}) % 4 = 0`),
  ],
);

/** Rows of a posted file that could not be read and were left out because the owner said so. */
export const rejectedRows = sqliteTable(
  'rejected_rows',
  {
    householdId: householdId(),
    documentId: text('document_id').notNull(),
    ordinal: integer('ordinal').notNull(),
    row: integer('row'),
    column: text('column_name'),
    found: text('found'),
    reason: text('reason').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.documentId, table.ordinal] }),
    foreignKey({
      columns: [table.householdId, table.documentId],
      foreignColumns: [documents.householdId, documents.id],
    }).onDelete('cascade'),
  ],
);

export const acceptedDifferences = sqliteTable(
  'accepted_differences',
  {
    householdId: householdId(),
    cycleTo: dayColumn('cycle_to').notNull(),
    check: text('check_key').notNull(),
    note: text('note').notNull(),
    by: text('by_name').notNull(),
    on: dayColumn('on_day').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.cycleTo, table.check] }),
    check('accepted_differences_days', sql`${isDay(table.cycleTo)} AND ${isDay(table.on)}`),
    check('accepted_differences_note', sql`length(${table.note}) BETWEEN 1 AND 1000`),
  ],
);
