import type { PrintedLine, RegisterRead, Statement } from '../facts/papers.ts';
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
};

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
 * the register reads of that day where every channel it reads has one, else by days (ledger.md §2).
 */
export function cyclePapers(inForce: readonly Statement[], switchOn: Day | null): CyclePaper[] {
  const papers: CyclePaper[] = [];
  inForce.forEach((statement, at) => {
    if (switchOn !== null && statement.to <= switchOn) return;
    const from = switchOn !== null && statement.from < switchOn ? switchOn : statement.from;
    const days = daysBetween(from, statement.to);
    const of = daysBetween(statement.from, statement.to);
    const split = from === statement.from ? null : { days, of };
    const own = split === null ? statement.reads : statement.reads.filter((read) => read.from >= from);
    const channels = new Set(statement.reads.map((read) => read.channel));
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
      reads: readsFit ? own : statement.reads,
      readsFit,
      lines: split === null ? statement.lines : statement.lines.map((line) => shareLine(line, days, of)),
    });
  });
  return papers;
}

/** The cycle's share of a printed line, by days. Its quantity is left out: nothing printed says it. */
function shareLine(line: PrintedLine, days: number, of: number): PrintedLine {
  const [share] = splitCents(line.amountCents, [days, of - days]);
  return { ...line, amountCents: share ?? line.amountCents, quantity: null };
}
