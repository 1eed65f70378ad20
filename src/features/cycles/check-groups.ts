import type { Check, CheckId } from '#shared/reconcile/check.ts';
import type { PairWords } from '#src/lib/check-words.ts';

export type CheckGroup = { title: string; open: Check[]; agreeing: Check[] };

const GROUPS = ['Dates and reads', 'Energy', 'The bill', 'Credit bank', 'Incentive'] as const;
type Group = (typeof GROUPS)[number];

const GROUP_OF: Record<CheckId, Group> = {
  datesChain: 'Dates and reads',
  days: 'Dates and reads',
  daysInRange: 'Dates and reads',
  registersFollow: 'Dates and reads',
  readType: 'Dates and reads',
  fileGaps: 'Energy',
  importAgainstIntervals: 'Energy',
  exportAgainstIntervals: 'Energy',
  exportWithinProduction: 'Energy',
  productionAgainstMonitor: 'Energy',
  productionAtNight: 'Energy',
  productionExpected: 'Energy',
  linePrice: 'The bill',
  bankChain: 'Credit bank',
  nothingLost: 'Credit bank',
  balanceChain: 'The bill',
  budgetChain: 'The bill',
  linesAddUp: 'The bill',
  amountDue: 'The bill',
  incentiveQuantity: 'Incentive',
  incentivePaid: 'Incentive',
};

const ORDER = { differs: 0, 'nothing-to-compare': 1, agrees: 2 } as const;

/** The checks by what they look at; in each group those that differ come first, then those with nothing to compare. Groups without a check are left out. */
export function groupedChecks(checks: readonly Check[]): CheckGroup[] {
  return GROUPS.map((title) => {
    const own = checks.filter((check) => groupOf(check) === title);
    return {
      title,
      open: own.filter((check) => check.verdict !== 'agrees').sort((a, b) => ORDER[a.verdict] - ORDER[b.verdict]),
      agreeing: own.filter((check) => check.verdict === 'agrees'),
    };
  }).filter(({ open, agreeing }) => open.length + agreeing.length > 0);
}

function groupOf({ check, about }: Check): Group {
  return check === 'nothingLost' && about.startsWith('exchange.') ? 'Dates and reads' : GROUP_OF[check];
}

const PAIRS: Partial<Record<CheckId, PairWords>> = {
  daysInRange: { stated: 'It has', found: 'the nearest usual length is' },
  fileGaps: { stated: 'The cycle has', found: 'the file is complete for' },
  productionAtNight: { stated: 'In the dark', found: 'possible' },
  productionExpected: { stated: 'Made', found: 'expected' },
  incentiveQuantity: { stated: 'Paid on', found: 'the production meter gives' },
  incentivePaid: { stated: 'Paid', found: 'earned' },
  nothingLost: { stated: 'Accounted for', found: 'of' },
};

/** How a check's two values are called; undefined for "stated" and "found". */
export function pairWords(check: CheckId): PairWords | undefined {
  return PAIRS[check];
}

/** What an agreeing check has to add: which receipt paid, what became of a balance. Null for the others. */
export function tellsMore({ check, cause, advice }: Check): string | null {
  if (check !== 'incentivePaid' && check !== 'nothingLost') return null;
  const said = [cause, advice].filter((part) => part !== null).join(' ');
  return said === '' ? null : said;
}
