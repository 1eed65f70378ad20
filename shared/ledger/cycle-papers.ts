import type { HouseFacts } from '../facts/house.ts';
import type { PrintedLine, ReadChannel, RegisterRead, Statement } from '../facts/papers.ts';
import { splitCents } from '../units/cents.ts';
import { type Day, daysBetween } from '../units/day.ts';

/** What one cycle is assembled from: its statement, and the part of it that belongs to the cycle. */
export type CyclePaper = {
  index: number;
  from: Day;
  to: Day;
  days: number;
  statement: Statement;
  /** The statement before, also one from before the record began; null for the first. */
  previous: Statement | null;
  /** Set where the statement began before the record: the cycle's share of its days. */
  split: { days: number; of: number } | null;
  /** Reads whose dates lie in the cycle; in a split without a read on the day, the whole statement's. */
  reads: RegisterRead[];
  /** True where `reads` cover the cycle alone and need no sharing by days. */
  readsFit: boolean;
  /** Printed lines, shared by days in a split. */
  lines: PrintedLine[];
  /** Registers that other service points' reads belong to: `apart` are not in `reads`, `joined` are, under an aggregation that nets together. */
  elsewhere: { apart: ReadonlySet<ReadChannel>; joined: ReadonlySet<ReadChannel> };
};

/** What of the house says which meters count, and from when. */
export type HouseOfPapers = Pick<HouseFacts, 'switchOn' | 'meters' | 'aggregation'>;

/**
 * The statements in force, by date: the highest revision of each id. Of two statements that end on one day the one entered last stands, since a
 * cycle is known by its last day.
 */
export function statementsInForce(statements: readonly Statement[]): Statement[] {
  const byId = new Map<string, Statement>();
  for (const statement of statements) {
    const known = byId.get(statement.id);
    if (!known || statement.revision > known.revision) byId.set(statement.id, statement);
  }
  const byEnd = new Map<Day, Statement>();
  for (const statement of byId.values()) {
    const known = byEnd.get(statement.to);
    if (!known || statement.enteredAt >= known.enteredAt) byEnd.set(statement.to, statement);
  }
  return [...byEnd.values()].sort((a, b) => (a.to < b.to ? -1 : 1));
}

/**
 * Cycles `[from, to)` from the statements in force. Those that end by the switch-on day are not cycles; one that holds the day is split there, by
 * the register reads of that day where every channel it reads has one, else by days (ledger.md §2). Reads of meters at other service points count
 * only where the utility nets them together with the house's.
 */
export function cyclePapers(inForce: readonly Statement[], house: HouseOfPapers): CyclePaper[] {
  const { switchOn } = house;
  const papers: CyclePaper[] = [];
  const others = new Set(house.meters.filter((meter) => meter.servicePoint !== null).map((meter) => meter.id));
  const together = house.aggregation === 'netTogether';
  inForce.forEach((statement, at) => {
    if (switchOn !== null && statement.to <= switchOn) return;
    const from = switchOn !== null && statement.from < switchOn ? switchOn : statement.from;
    const days = daysBetween(from, statement.to);
    const of = daysBetween(statement.from, statement.to);
    const split = from === statement.from ? null : { days, of };
    const away = others.size === 0 ? [] : statement.reads.filter((read) => others.has(read.meter));
    const counted =
      away.length === 0 || together ? statement.reads : statement.reads.filter((read) => !away.includes(read));
    const own = split === null ? counted : counted.filter((read) => read.from >= from);
    const channels = new Set(counted.map((read) => read.channel));
    const awayOf = new Set(away.map((read) => read.channel));
    const readsFit =
      split === null || [...channels].every((c) => own.some((read) => read.channel === c && read.from === from));
    papers.push({
      index: papers.length,
      from,
      to: statement.to,
      days,
      statement,
      previous: inForce[at - 1] ?? null,
      split,
      reads: readsFit ? own : counted,
      readsFit,
      lines: split === null ? statement.lines : statement.lines.map((line) => shareLine(line, days, of)),
      elsewhere: together ? { apart: NO_CHANNELS, joined: awayOf } : { apart: awayOf, joined: NO_CHANNELS },
    });
  });
  return papers;
}

const NO_CHANNELS: ReadonlySet<ReadChannel> = new Set();

/** The cycle's share of a printed line, by days. Its quantity is left out: nothing printed says it. */
function shareLine(line: PrintedLine, days: number, of: number): PrintedLine {
  const [share] = splitCents(line.amountCents, [days, of - days]);
  return { ...line, amountCents: share ?? line.amountCents, quantity: null };
}
