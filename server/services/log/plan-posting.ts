import type { StatementBody } from '#shared/api/cycles.ts';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { IntervalDay, PaperSource, Statement } from '#shared/facts/papers.ts';
import type { ProblemCode } from '#shared/problem.ts';
import type { Day } from '#shared/units/day.ts';
import type { Draft, DraftedReading, DraftedStatement } from '../../db/drafts.ts';
import { sayCycle } from '../say-days.ts';
import {
  bodyOfStatement,
  overlap,
  sameDates,
  sameStatement,
  statementsInForce,
  withoutStaleRows,
} from '../statements-in-force.ts';
import { mergeDay } from './merge-day.ts';

export type Blocker = { code: ProblemCode; message: string };

/** What posting would do with a drafted statement. */
export type StatementPlan = {
  drafted: DraftedStatement;
  edited: boolean;
  replaces: { from: Day; to: Day; revision: number } | null;
  alreadyPosted: boolean;
  /** The statement whose cycle shows the checks: the one to be posted, or the posted one; null while it is blocked. */
  statementId: string | null;
};

/** What posting would do with a drafted reading. */
export type ReadingPlan = { drafted: DraftedReading; sameDays: number; differentDays: Day[] };

/** All that posting would write, and what stands in its way. The view of the draft and the posting itself both follow it. */
export type PostingPlan = {
  statements: StatementPlan[];
  readings: ReadingPlan[];
  /** Statements to insert. */
  insert: Statement[];
  /** Days to put in place: new, fuller, and different ones. */
  put: IntervalDay[];
  blockers: Blocker[];
  /** The household's facts as they would be. */
  facts: HouseholdFacts;
};

export type Poster = { name: string; today: Day; now: string };

function sourceOf(drafted: DraftedStatement, poster: Poster): PaperSource {
  const { documentId, fileName, firstRow, lastRow } = drafted;
  if (documentId === null || fileName === null) return { kind: 'typed', by: poster.name, on: poster.today };
  return { kind: 'file', documentId, fileName, firstRow: firstRow ?? 1, lastRow: lastRow ?? firstRow ?? 1 };
}

export function wasEdited({ asRead, statement }: DraftedStatement): boolean {
  return asRead !== null && !sameStatement(asRead, statement);
}

function reasonFor(drafted: DraftedStatement, replacing: boolean): string | null {
  const edited = wasEdited(drafted);
  if (drafted.fileName !== null && edited)
    return `Read from ${drafted.fileName}; values changed by hand before posting.`;
  if (!replacing) return null;
  return drafted.fileName === null
    ? 'Typed again with other values.'
    : `Read again from ${drafted.fileName} with other values.`;
}

/** A statement of the draft crosses a cycle: which, and whether that one is posted. */
function crossing(
  statement: StatementBody,
  posted: readonly Statement[],
  others: readonly DraftedStatement[],
): Blocker | null {
  const here = posted.find((found) => overlap(found, statement) && !sameDates(found, statement));
  if (here !== undefined) {
    return {
      code: 'cycle-overlaps',
      message: `${sayCycle(statement)} overlaps ${sayCycle(here)}, which is posted. Put the dates right, or correct the posted cycle first.`,
    };
  }
  const drafted = others.find((found) => overlap(found.statement, statement));
  if (drafted === undefined) return null;
  return {
    code: 'cycle-overlaps',
    message: sameDates(drafted.statement, statement)
      ? `${sayCycle(statement)} is in this log twice. Remove one of the two.`
      : `${sayCycle(statement)} overlaps ${sayCycle(drafted.statement)}, which is in this log too. Put the dates right, or remove one.`,
  };
}

function planStatements(draft: Draft, posted: readonly Statement[], poster: Poster) {
  const plans: StatementPlan[] = [];
  const insert: Statement[] = [];
  const blockers: Blocker[] = [];
  for (const [index, drafted] of draft.statements.entries()) {
    const { statement } = drafted;
    const twin = posted.find((found) => sameDates(found, statement)) ?? null;
    const edited = wasEdited(drafted);
    const blocked = crossing(statement, posted, draft.statements.slice(0, index));
    const alreadyPosted = twin !== null && sameStatement(bodyOfStatement(twin), statement);
    if (blocked !== null) blockers.push(blocked);
    else if (!alreadyPosted) {
      insert.push({
        ...(drafted.asRead === null ? statement : withoutStaleRows(statement, drafted.asRead)),
        id: twin?.id ?? drafted.key,
        revision: (twin?.revision ?? 0) + 1,
        source: sourceOf(drafted, poster),
        reason: reasonFor(drafted, twin !== null),
        enteredBy: poster.name,
        enteredAt: poster.now,
      });
    }
    plans.push({
      drafted,
      edited,
      replaces: twin === null || alreadyPosted ? null : { from: twin.from, to: twin.to, revision: twin.revision },
      alreadyPosted,
      statementId: blocked === null ? (twin?.id ?? drafted.key) : null,
    });
  }
  return { plans, insert, blockers };
}

function planReadings(draft: Draft, here: readonly IntervalDay[]) {
  const days = new Map(here.map((interval) => [`${interval.channel} ${interval.day}`, interval]));
  const put = new Map<string, IntervalDay>();
  const plans = draft.readings.map((drafted): ReadingPlan => {
    let sameDays = 0;
    const differentDays: Day[] = [];
    for (const found of drafted.reading.days) {
      const key = `${found.channel} ${found.day}`;
      const merged = mergeDay(days.get(key) ?? null, { ...found, documentId: drafted.documentId });
      if (merged.kind === 'same') {
        sameDays += 1;
        continue;
      }
      if (merged.kind === 'different') differentDays.push(found.day);
      days.set(key, merged.day);
      put.set(key, merged.day);
    }
    return { drafted, sameDays, differentDays };
  });
  return { plans, put: [...put.values()], intervals: [...days.values()] };
}

const rows = (count: number) => (count === 1 ? '1 row' : `${count} rows`);

function fileBlockers(draft: Draft): Blocker[] {
  const faulty = (fileName: string, count: number): Blocker => ({
    code: 'conflict',
    message: `${fileName}: ${rows(count)} cannot be read. Correct the file and upload it again, or say that the good rows shall be kept.`,
  });
  const statementFiles = draft.files.flatMap((file) => {
    if (file.faults.length > 0 && !file.keepGoodRows) {
      const places = new Set(file.faults.map((fault) => fault.row));
      return [faulty(file.fileName, places.size)];
    }
    const left = draft.statements.some((drafted) => drafted.documentId === file.documentId);
    return left
      ? []
      : [{ code: 'conflict' as const, message: `${file.fileName} holds no statement to post. Remove it.` }];
  });
  const readingFiles = draft.readings.flatMap(({ fileName, reading, keepGoodRows }) => {
    if (reading.days.length === 0) {
      return [
        {
          code: 'conflict' as const,
          message: `${fileName} holds no reading that can be used. Correct how it is read, or remove it.`,
        },
      ];
    }
    const bad = Math.max(reading.rejectedRows.length, new Set(reading.faults.map((fault) => fault.row)).size);
    return bad > 0 && !keepGoodRows ? [faulty(fileName, bad)] : [];
  });
  return [...statementFiles, ...readingFiles];
}

/** Works out what posting the draft would do to the household. Pure. */
export function planPosting(facts: HouseholdFacts, draft: Draft, poster: Poster): PostingPlan {
  const statements = planStatements(draft, statementsInForce(facts.statements), poster);
  const readings = planReadings(draft, facts.intervals);
  return {
    statements: statements.plans,
    readings: readings.plans,
    insert: statements.insert,
    put: readings.put,
    blockers: [...fileBlockers(draft), ...statements.blockers],
    facts: {
      ...facts,
      documents: [...facts.documents, ...draft.documents],
      statements: [...facts.statements, ...statements.insert],
      intervals: readings.intervals,
    },
  };
}
