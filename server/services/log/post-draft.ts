import type { PostedView } from '#shared/api/log.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { dateWords } from '#shared/units/words.ts';
import type { Tx } from '../../db/client.ts';
import type { Draft } from '../../db/drafts.ts';
import { readDraft } from '../../db/drafts.ts';
import { insertStatement, keepDocument, putIntervalDay } from '../../db/facts/write-papers.ts';
import { rejectedRows } from '../../db/schema/papers.ts';
import { clearDraft } from '../../db/write-drafts.ts';
import type { Actor, Deps } from '../../deps.ts';
import { type HouseholdLedger, ledgerOf } from '../ledger-of.ts';
import { differingChecks } from '../list-cycles.ts';
import { writeHousehold } from '../write-household.ts';
import { type PostingPlan, planPosting } from './plan-posting.ts';

function writeRejected(tx: Tx, householdId: string, draft: Draft): void {
  for (const { documentId, faults } of draft.files) {
    for (const [ordinal, { row, column, found, message }] of faults.entries()) {
      tx.insert(rejectedRows).values({ householdId, documentId, ordinal, row, column, found, reason: message }).run();
    }
  }
  const next = new Map<string, number>();
  for (const { documentId, reading } of draft.readings) {
    for (const { row, reason } of reading.rejectedRows) {
      const ordinal = next.get(documentId) ?? 0;
      next.set(documentId, ordinal + 1);
      tx.insert(rejectedRows)
        .values({ householdId, documentId, ordinal, row, column: null, found: null, reason })
        .onConflictDoNothing()
        .run();
    }
  }
}

function postedView(plan: PostingPlan, before: HouseholdLedger, after: HouseholdLedger): PostedView {
  const inserted = new Set(plan.insert.map((statement) => statement.id));
  const readingsDays: Record<string, number> = {};
  for (const { channel } of plan.put) readingsDays[channel] = (readingsDays[channel] ?? 0) + 1;
  return {
    cycles: after.ledger.cycles
      .filter((cycle) => inserted.has(cycle.statement.id))
      .map((cycle) => ({
        from: cycle.from,
        to: cycle.to,
        addedCents: cycle.addedCents,
        entries: cycle.entries,
        billedDueCents: cycle.billedDueCents,
        oursDueCents: cycle.oursDueCents,
        state: cycle.state,
        differs: differingChecks(cycle),
      })),
    readingsDays,
    settledBeforeCents: before.ledger.position.settledToday.amountCents,
    settledAfterCents: after.ledger.position.settledToday.amountCents,
    cashBeforeCents: before.ledger.position.cashSoFar.amountCents,
    cashAfterCents: after.ledger.position.cashSoFar.amountCents,
  };
}

/**
 * Makes the log in progress a fact, all of it or nothing: statements (new, or a new revision of the same cycle), readings, files, and the rows left
 * out with their reasons. Refuses while something stands in the way, and asks before readings that are here are replaced by other values.
 */
export function postDraft(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Actor,
  given: { replaceReadings: boolean },
): Result<PostedView> {
  const { householdId } = actor;
  const before = ledgerOf(deps, householdId);
  const draft = readDraft(deps.db, householdId);
  const poster = { name: actor.name, today: before.today, now: deps.clock().toISOString() };
  const plan = planPosting(before.facts, draft, poster);
  const [blocker] = plan.blockers;
  if (blocker !== undefined) return fail(blocker.code, plan.blockers.map(({ message }) => message).join(' '));
  if (plan.insert.length === 0 && plan.put.length === 0) {
    return draft.statements.length > 0
      ? fail('cycle-already-posted', 'Everything in this log is posted already. Nothing was changed.')
      : fail('nothing-to-post', 'There is nothing in this log yet.');
  }
  const different = plan.readings.find((reading) => reading.differentDays.length > 0);
  if (different !== undefined && !given.replaceReadings) {
    const [first] = different.differentDays;
    const count = plan.readings.reduce((sum, reading) => sum + reading.differentDays.length, 0);
    return fail(
      'readings-conflict',
      `${different.drafted.fileName} has other values than are here for ${count} ${count === 1 ? 'day' : 'days'}${first === undefined ? '' : `, the first ${dateWords(first)}`}. Say whether they shall be replaced.`,
    );
  }
  const about = [
    ...plan.insert.map((statement) => `${statement.to} r${statement.revision}`),
    `${plan.put.length} days`,
  ].join(', ');
  const written = writeHousehold(deps, actor, { action: 'log-posted', about }, (tx) => {
    for (const { id } of draft.documents) keepDocument(tx, householdId, id);
    for (const statement of plan.insert) insertStatement(tx, householdId, statement);
    for (const interval of plan.put) putIntervalDay(tx, householdId, interval);
    writeRejected(tx, householdId, draft);
    clearDraft(tx, householdId);
    return succeed(null);
  });
  if (!written.ok) return written;
  return succeed(postedView(plan, before, ledgerOf(deps, householdId)));
}
