import type { StatementBody } from '#shared/api/cycles.ts';
import type { Statement } from '#shared/facts/papers.ts';

/** The highest revision of each statement, by the day it ends on. */
export function statementsInForce(all: readonly Statement[]): Statement[] {
  const latest = new Map<string, Statement>();
  for (const statement of all) {
    const known = latest.get(statement.id);
    if (known === undefined || known.revision < statement.revision) latest.set(statement.id, statement);
  }
  return [...latest.values()].sort((a, b) => (a.to < b.to ? -1 : a.to > b.to ? 1 : 0));
}

export function bodyOfStatement(statement: Statement): StatementBody {
  const {
    id: _id,
    revision: _revision,
    source: _source,
    reason: _reason,
    enteredBy: _by,
    enteredAt: _at,
    ...body
  } = statement;
  return body;
}

type Span = { from: string; to: string };

export function sameDates(a: Span, b: Span): boolean {
  return a.from === b.from && a.to === b.to;
}

/** True where two cycles share a day. */
export function overlap(a: Span, b: Span): boolean {
  return a.from < b.to && b.from < a.to;
}

/** The body with every place in a file left out, in one order of keys: what makes two statements say the same. */
function content(body: StatementBody): string {
  const blank = <T extends { row: number | null }>(list: readonly T[]) => list.map((item) => ({ ...item, row: null }));
  const plain: Record<string, unknown> = {
    ...body,
    reads: blank(body.reads),
    lines: blank(body.lines),
    banks: blank(body.banks),
  };
  return JSON.stringify(plain, (_key, value: unknown) =>
    typeof value === 'object' && value !== null && !Array.isArray(value)
      ? Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)))
      : value,
  );
}

/** Whether two statements say the same, wherever they were read. */
export function sameStatement(a: StatementBody, b: StatementBody): boolean {
  return content(a) === content(b);
}

/**
 * The changed statement with the row of each value that is no longer as it was read taken away: what a person typed over does not
 * stand in the file.
 */
export function withoutStaleRows(changed: StatementBody, asRead: StatementBody): StatementBody {
  const keep = <T extends { row: number | null }>(list: readonly T[], original: readonly T[]): T[] => {
    const known = new Set(original.map((item) => JSON.stringify(Object.entries(item).sort())));
    return list.map((item) => (known.has(JSON.stringify(Object.entries(item).sort())) ? item : { ...item, row: null }));
  };
  return {
    ...changed,
    reads: keep(changed.reads, asRead.reads),
    lines: keep(changed.lines, asRead.lines),
    banks: keep(changed.banks, asRead.banks),
  };
}
