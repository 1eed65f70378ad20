import type { PrintedLine } from '../facts/papers.ts';
import { isCarried, isElectric } from '../reconcile/electric-lines.ts';
import { type Cents, sumCents } from '../units/cents.ts';
import type { FacingLine } from './cycle.ts';
import type { CyclePaper } from './cycle-papers.ts';
import { accountLines, budgetLines, budgetOf, electricCents } from './due-parts.ts';
import { facingLine, type Pair, pairUp } from './facing-pairs.ts';
import { carriedLine, type Side, totalLine } from './facing-totals.ts';
import type { SettledCycle } from './settle-cycle.ts';

/** The facing pages and what they come to. `electric` is the charges for electricity alone, as billed and as settled. */
export type Facing = {
  lines: FacingLine[];
  billedDueCents: Cents;
  oursDueCents: Cents | null;
  electric: { billedCents: Cents; oursCents: Cents | null; lines: number };
  /** How many lines stand on the pages, totals apart. */
  count: number;
};

type Section = 'electric' | 'other' | 'account';

/**
 * Billed lines facing ours. First electricity, in the order printed; ours that are not printed follow, where they come to anything. Then other
 * services, late fees and deposits, the balance and payments, and the budget amount, each kept apart; last `Due`. What no rate plan can say stands
 * on our side as billed, so that both sides add up. In a cycle split at switch-on nothing is judged: its billed lines are shares by days.
 */
export function facingLines(paper: CyclePaper, settled: SettledCycle): Facing {
  const known = settled.ours !== null;
  const judged = known && paper.split === null;
  const shown: Record<Section, FacingLine[]> = { electric: [], other: [], account: [] };
  const taken: Record<Section, Cents[]> = { electric: [], other: [], account: [] };
  const carry = (section: Section, line: PrintedLine, key: string) => {
    shown[section].push(carriedLine(paper, line, key, known));
    if (line.inDue) taken[section].push(line.amountCents);
  };
  pairUp(paper.lines, settled).forEach((pair, at) => {
    const [first] = pair.billed;
    if (first && isCarried(first, pair.component)) {
      carry(sectionOf(pair, first), first, `carried:${at}`);
      return;
    }
    const line = facingLine(pair, at, judged);
    if (line) shown.electric.push(line);
  });
  for (const line of openAccountLines(paper)) carry('account', line, `carried:${line.kind}`);

  const settledDue = settled.ours?.settlement.lines.filter((line) => line.inDue) ?? [];
  const electricOurs: Side = {
    settled: settledDue.map(({ label, amountCents }) => ({ label, amountCents })),
    carried: taken.electric,
  };
  const onBudget = budgetOf(paper) !== null;
  const apart = budgetLines(paper);
  const withoutElectric = [...taken.other, ...taken.account, ...apart.map((line) => line.amountCents)];
  const dueOurs: Side = onBudget
    ? { settled: [], carried: withoutElectric }
    : { settled: electricOurs.settled, carried: [...taken.electric, ...withoutElectric] };

  const billed = electricCents(paper.lines);
  const billedDueCents =
    paper.split === null
      ? paper.statement.amountDueCents
      : sumCents(paper.lines.filter((line) => line.inDue).map((line) => line.amountCents));
  const total = (key: string, label: string, billedCents: Cents, ours: Side, lines: number) =>
    totalLine(paper, { key, label, billedCents, ours: known ? ours : null, judged, lines });
  const electric = total('subtotal:electric', 'Electric charges', billed, electricOurs, shown.electric.length);
  const others = { settled: [], carried: taken.other };
  const other = total('subtotal:other', 'Other services', sumCents(taken.other), others, shown.other.length);
  const parts = shown.electric.length + shown.other.length + shown.account.length + apart.length;
  const due = total('due', 'Due', billedDueCents, dueOurs, parts);
  const instalments = apart.map((line, at) => carriedLine(paper, line, `carried:budget${at}`, known));
  return {
    lines: [
      ...shown.electric,
      ...(onBudget || shown.other.length > 0 ? [electric] : []),
      ...instalments,
      ...shown.other,
      ...(shown.other.length > 1 ? [{ ...other, verdict: 'nothing-to-compare' as const }] : []),
      ...shown.account,
      due,
    ],
    billedDueCents,
    oursDueCents: due.ours?.amountCents ?? null,
    electric: {
      billedCents: billed,
      oursCents: electric.ours?.amountCents ?? null,
      lines: shown.electric.length,
    },
    count: parts,
  };
}

function sectionOf(pair: Pair, line: PrintedLine): Section {
  if (line.kind === 'previousBalance' || line.kind === 'payment') return 'account';
  if (line.kind === 'otherService') return 'other';
  return pair.component === null && line.inDue && !isElectric(line) ? 'other' : 'electric';
}

/** The balance and payments of the statement's head, left out where they cancel each other: then they change nothing on this page. */
function openAccountLines(paper: CyclePaper): PrintedLine[] {
  const made = accountLines(paper);
  return sumCents(made.map((line) => line.amountCents)) === 0 ? [] : made;
}
