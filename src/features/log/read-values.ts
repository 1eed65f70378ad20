import type { StatementBody } from '#shared/api/cycles.ts';
import type { DraftStatement } from '#shared/api/log.ts';
import type { ReadChannel } from '#shared/facts/papers.ts';
import type { FacingLine } from '#shared/ledger/cycle.ts';
import type { Check, CheckId } from '#shared/reconcile/check.ts';
import { decimal } from '#src/lib/format.ts';
import {
  bankFields,
  budgetField,
  CHANNEL_WORDS,
  dateFields,
  KWH_FIELDS,
  kwhField,
  lineField,
  lineLabel,
  moneyField,
  type ReadField,
  readFields,
  registerLabel,
} from './read-fields.ts';

export type ValueTone = 'ok' | 'no' | 'wait';

/** One row of "What we read": a value or a pair, its verdict, and notes where it needs an eye. */
export type ReadValue = {
  key: string;
  label: string;
  fields: ReadField[];
  tone: ValueTone | null;
  verdict: string;
  notes: string[];
  doubtful: boolean;
  /** Rows of the file it was read from; empty when typed or when the row is not known. */
  rows: number[];
  total: boolean;
};

const INTERVAL_CHECKS: Record<ReadChannel, CheckId[]> = {
  import: ['importAgainstIntervals'],
  export: ['exportAgainstIntervals', 'exportWithinProduction'],
  production: ['productionAgainstMonitor'],
};

/** How an agreeing check is said where the value stands. */
const AGREES: Record<CheckId, string> = {
  datesChain: 'follows the last',
  days: 'agrees',
  daysInRange: 'usual length',
  registersFollow: 'follows on',
  readType: 'agrees',
  fileGaps: 'complete',
  importAgainstIntervals: 'agrees',
  exportAgainstIntervals: 'agrees',
  exportWithinProduction: 'agrees',
  productionAgainstMonitor: 'agrees',
  productionAtNight: 'none',
  productionExpected: 'as expected',
  linePrice: 'adds up',
  bankChain: 'follows the last',
  nothingLost: 'nothing lost',
  balanceChain: 'carries over',
  budgetChain: 'carries over',
  linesAddUp: 'lines add up',
  incentiveQuantity: 'agrees',
  incentivePaid: 'paid',
  amountDue: 'agrees',
};

/**
 * Every value of a drafted statement with the checks that concern it. Where a printed line faces none of the plan's, it is a new line; a
 * check that nothing here stands for is left for the foot of the list (`otherChecks`).
 */
export function readValues(drafted: DraftStatement): { values: ReadValue[]; otherChecks: Check[] } {
  const { statement } = drafted;
  const taken = new Set<Check>();
  const take = (fits: (check: Check) => boolean): Check[] => {
    const found = drafted.checks.filter((check) => !taken.has(check) && fits(check));
    for (const check of found) taken.add(check);
    return found;
  };
  const values: ReadValue[] = [
    value(
      'dates',
      'Service dates',
      dateFields(statement),
      take((check) => ['datesChain', 'days', 'daysInRange'].includes(check.check)),
    ),
  ];
  statement.reads.forEach((read, index) => {
    const mine = take(
      (check) =>
        (check.check === 'registersFollow' && check.about === `${read.channel}:${read.meter}`) ||
        (check.check === 'readType' && read.type === 'estimated') ||
        (statement[KWH_FIELDS[read.channel]] === null && INTERVAL_CHECKS[read.channel].includes(check.check)),
    );
    const row = value(
      `read${index}`,
      registerLabel(read, statement.reads),
      readFields(statement, index),
      mine,
      read.row,
    );
    values.push(
      read.type === 'estimated'
        ? { ...row, verdict: row.tone === 'no' ? row.verdict : 'estimated', tone: row.tone ?? 'wait' }
        : row,
    );
  });
  for (const channel of ['import', 'export', 'production'] as const) {
    const name = KWH_FIELDS[channel];
    if (statement[name] === null) continue;
    const rows = statement.reads.filter((read) => read.channel === channel).flatMap((read) => read.row ?? []);
    const mine = take((check) => INTERVAL_CHECKS[channel].includes(check.check));
    values.push({
      ...value(name, `${CHANNEL_WORDS[channel]}, kWh as printed`, [kwhField(statement, channel)], mine),
      rows,
    });
  }
  const faced = facingByLabel(drafted.facing);
  statement.lines.forEach((line, index) => {
    const facing = faced(line.label);
    const part = partOf(facing);
    const component = line.component ?? part?.split(':')[0];
    const mine = take((check) => check.check === 'linePrice' && (check.about === part || check.about === component));
    const made = value(`line${index}`, lineLabel(line), [lineField(statement, index)], mine, line.row);
    values.push(isNewLine(line, facing, drafted) && made.tone !== 'no' ? newLine(made) : made);
  });
  statement.banks.forEach((bank, index) => {
    const mine = take(
      (check) =>
        check.check === 'bankChain' &&
        (statement.banks.length === 1 || check.about.replace(/\.close$/, '') === bank.bank),
    );
    values.push(
      value(
        `bank${index}`,
        `Credit bank, ${bank.unit === 'USD' ? 'in dollars' : 'kWh'}`,
        bankFields(statement, index),
        mine,
        bank.row,
      ),
    );
  });
  for (const name of ['previousBalanceCents', 'paymentsCents'] as const) {
    const label = name === 'previousBalanceCents' ? 'Previous balance' : 'Payments';
    if (statement[name] === null) continue;
    const mine = name === 'previousBalanceCents' ? take((check) => check.check === 'balanceChain') : [];
    values.push(value(name, label, [moneyField(statement, name, label)], mine));
  }
  if (statement.budget !== null) {
    const mine = take((check) => check.check === 'budgetChain');
    values.push(value('budget', 'Budget amount', [budgetField(statement, 'instalmentCents', 'Budget amount')], []));
    values.push(
      value('budgetBalance', 'Budget balance', [budgetField(statement, 'balanceCents', 'Budget balance')], mine),
    );
    if (statement.budget.settledCents !== null) {
      values.push(value('budgetSettled', 'Settlement', [budgetField(statement, 'settledCents', 'Settlement')], []));
    }
  }
  const due = value(
    'due',
    'Due',
    [moneyField(statement, 'amountDueCents', 'Due')],
    take((check) => check.check === 'linesAddUp' || check.check === 'amountDue'),
  );
  values.push({ ...due, total: true });
  return { values, otherChecks: drafted.checks.filter((check) => !taken.has(check) && check.verdict === 'differs') };
}

/** How many single values stand in the rows, and how many of the rows need an eye. */
export function countValues(values: ReadValue[]): { read: number; doubtful: number } {
  return {
    read: values.reduce((sum, one) => sum + one.fields.filter((field) => field.text !== '').length, 0),
    doubtful: values.filter((one) => one.doubtful).length,
  };
}

function value(key: string, label: string, fields: ReadField[], checks: Check[], row: number | null = null): ReadValue {
  const differing = checks.filter((check) => check.verdict === 'differs' && check.accepted === null);
  const worst = differing[0] ?? checks.find((check) => check.verdict === 'agrees') ?? checks[0] ?? null;
  const tone: ValueTone | null =
    worst === null ? null : worst.verdict === 'differs' ? 'no' : worst.verdict === 'agrees' ? 'ok' : 'wait';
  return {
    key,
    label,
    fields,
    tone,
    verdict: worst === null ? '' : verdictWords(worst),
    // Two checks that fail for one cause are said once.
    notes: differing.filter((check, at) => differing.findIndex((one) => one.cause === check.cause) === at).map(noteOf),
    doubtful: differing.length > 0,
    rows: row === null ? [] : [row],
    total: false,
  };
}

function verdictWords(check: Check): string {
  if (check.verdict === 'agrees') return AGREES[check.check];
  if (check.verdict === 'nothing-to-compare') return 'nothing to compare';
  const size = check.difference?.replace('-', '');
  if (size === undefined) return 'differs';
  switch (check.unit) {
    case 'USD':
      return `differs, $${decimal(size)}`;
    case 'kWh':
      return `differs, ${decimal(size)} kWh`;
    case 'days':
      return `differs, ${decimal(size)} days`;
    default:
      return 'differs';
  }
}

/** What differs and what to do. If the paper really says so, it is posted as printed. */
function noteOf(check: Check): string {
  const said = [
    check.cause ?? `${check.title}: ${check.stated ?? 'nothing'} on the page, ${check.found ?? 'nothing'} found.`,
    check.advice,
  ];
  return said.filter((part) => part !== null).join(' ');
}

function newLine(made: ReadValue): ReadValue {
  return {
    ...made,
    tone: 'wait',
    verdict: 'new line',
    doubtful: true,
    notes: [
      ...made.notes,
      'The rate plan has no such line, so its price cannot be checked. If it is a lasting charge, add it to the plan.',
    ],
  };
}

function facingByLabel(facing: FacingLine[]): (label: string) => FacingLine | null {
  return (label) => facing.find((line) => line.billed !== null && line.label === label) ?? null;
}

/** The component a line faces, with its period and tier where those are told apart: "energy", "energy:peak". */
function partOf(facing: FacingLine | null): string | null {
  return /^line:(.+):\d+$/.exec(facing?.key ?? '')?.[1] ?? null;
}

const CARRIED = new Set(['otherService', 'previousBalance', 'payment']);

/** Electric lines that the plan says nothing of; only where there is a plan to compare with at all. */
function isNewLine(line: StatementBody['lines'][number], facing: FacingLine | null, drafted: DraftStatement): boolean {
  const planned = drafted.facing.some((one) => one.key.startsWith('line:') && one.ours !== null);
  return planned && !CARRIED.has(line.kind) && (facing?.key.startsWith('printed:') ?? false);
}
