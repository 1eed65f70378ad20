import type { StatementBody } from '#shared/api/cycles.ts';
import type { SetupView } from '#shared/api/setup.ts';
import type { MeterFacts } from '#shared/facts/house.ts';
import type { RatePlan, RateRow } from '#shared/settlement/plan.ts';
import { textOf } from '#src/lib/typed-values.ts';
import {
  emptyLine,
  emptyRead,
  type LineRow,
  type StatementFormValues,
} from '#src/ui/statement-form/statement-values.ts';

/**
 * A statement to be typed, laid out so that only figures are left to fill in: reads, banks and balance follow on from the last statement, lines
 * are the last one's, else the rate plan's; meters are the house's where no statement has named them.
 */
export function emptyStatementForm(stated: SetupView | null, last: StatementBody | null): StatementFormValues {
  const plan = stated?.plans.at(-1)?.plan ?? null;
  return {
    from: last?.to ?? '',
    to: '',
    days: '',
    statementOn: '',
    dueOn: '',
    reads: last && last.reads.length > 0 ? nextReads(last) : readsOfMeters(stated?.house.meters ?? []),
    importKwh: '',
    exportKwh: '',
    productionKwh: '',
    lines: last && last.lines.length > 0 ? nextLines(last, plan) : linesOfPlan(plan),
    banks:
      last && last.banks.length > 0
        ? last.banks.map((bank) => ({
            bank: bank.bank,
            label: bankLabel(bank.bank, plan),
            unit: bank.unit,
            open: bank.close ?? '',
            close: '',
            sentOut: '',
            sentValue: '',
            row: null,
          }))
        : (plan?.banks ?? []).map((bank) => ({
            bank: bank.id,
            label: bank.label,
            unit: bank.unit,
            open: '',
            close: '',
            sentOut: '',
            sentValue: '',
            row: null,
          })),
    previousBalance: textOf.cents(last?.amountDueCents ?? null),
    payments: '',
    due: '',
    budget: textOf.cents(last?.budget?.instalmentCents ?? null),
    budgetBalance: '',
    budgetSettled: '',
    reason: '',
  };
}

function bankLabel(id: string, plan: RatePlan | null): string {
  return plan?.banks.find((bank) => bank.id === id)?.label ?? id;
}

/** The registers as they stood at the end of the last statement; a meter that was taken out in it does not come again. */
function nextReads(last: StatementBody): StatementFormValues['reads'] {
  return last.reads
    .filter((read) => read.to === last.to)
    .map((read) => ({
      ...read,
      from: '',
      to: '',
      previous: read.current,
      current: '',
      dials: String(read.dials),
      type: 'actual',
      row: null,
    }));
}

function readsOfMeters(meters: MeterFacts[]): StatementFormValues['reads'] {
  return meters.flatMap((meter) =>
    meter.channels.map((one) => ({
      ...emptyRead({ meter: meter.id, dials: String(meter.dials), multiplier: meter.multiplier }),
      channel: one,
    })),
  );
}

/** The last statement's lines without their figures; a line that stood in two parts is laid out once. */
function nextLines(last: StatementBody, plan: RatePlan | null): LineRow[] {
  const rateOf = new Map(linesOfPlan(plan).map((line) => [line.component, line.rate]));
  return last.lines
    .filter((line, index) => last.lines.findIndex((one) => one.label === line.label) === index)
    .map((line) => ({
      ...emptyLine(),
      component: line.component,
      kind: line.kind,
      label: line.label,
      unit: line.unit ?? '',
      rate: rateOf.get(line.component) ?? textOf.text(line.rate),
      inDue: line.inDue,
    }));
}

function linesOfPlan(plan: RatePlan | null): LineRow[] {
  const charges = (plan?.charges ?? []).map(
    (charge): LineRow => ({
      ...emptyLine(),
      component: charge.id,
      kind: charge.kind,
      label: charge.label,
      unit:
        charge.basis === 'cycle' || charge.basis === 'day' ? charge.basis : charge.basis === 'percent' ? 'USD' : 'kWh',
      rate: lastRate(charge.rates),
    }),
  );
  const credits = (plan?.credits ?? [])
    .filter((credit) => credit.to !== 'separate')
    .map(
      (credit): LineRow => ({
        ...emptyLine(),
        component: credit.id,
        kind: credit.kind,
        label: credit.label,
        unit: 'kWh',
        rate: lastRate(credit.rates ?? []),
        inDue: credit.to === 'bill',
      }),
    );
  const spent = (plan?.banks ?? [])
    .filter((bank) => bank.unit === 'USD' && bank.offsets.length > 0)
    .map((bank): LineRow => ({ ...emptyLine(), component: bank.id, kind: 'credit', label: bank.label }));
  return [...charges, ...credits, ...spent];
}

function lastRate(rates: RateRow[]): string {
  return rates.length > 0 && rates.every((row) => !row.season && !row.period && !row.tier)
    ? (rates.at(-1)?.rate ?? '')
    : '';
}
