import type { DraftReadings, DraftStatement, LogDraft } from '#shared/api/log.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Cycle } from '#shared/ledger/cycle.ts';
import { daysBetween } from '#shared/units/day.ts';
import { readDraft } from '../../db/drafts.ts';
import type { Actor, Deps } from '../../deps.ts';
import { ledgerOf } from '../ledger-of.ts';
import { sayCycle } from '../say-days.ts';
import { statementsInForce } from '../statements-in-force.ts';
import { type PostingPlan, planPosting, type ReadingPlan, type StatementPlan } from './plan-posting.ts';

function draftStatementOf(plan: StatementPlan, cycle: Cycle | null): DraftStatement {
  const { drafted } = plan;
  return {
    key: drafted.key,
    fileName: drafted.fileName,
    documentId: drafted.documentId,
    statement: drafted.statement,
    edited: plan.edited,
    replaces: plan.replaces,
    alreadyPosted: plan.alreadyPosted,
    checks: cycle?.checks ?? [],
    facing: cycle?.facing ?? [],
    billedDueCents: cycle?.billedDueCents ?? drafted.statement.amountDueCents,
    oursDueCents: cycle?.oursDueCents ?? null,
  };
}

function draftReadingsOf({ drafted, sameDays, differentDays }: ReadingPlan): DraftReadings {
  const { reading } = drafted;
  return {
    key: drafted.key,
    fileName: drafted.fileName,
    documentId: drafted.documentId,
    mapping: reading.mapping,
    doubts: reading.doubts,
    columns: reading.columns,
    table: reading.table,
    firstDay: reading.firstDay,
    lastDay: reading.lastDay,
    minutes: reading.minutes,
    totalWh: reading.totalWh,
    acceptedRows: reading.acceptedRows,
    rejectedRows: reading.rejectedRows.length,
    missingSteps: reading.missingSteps,
    clippedNegativeWh: reading.clippedNegativeWh,
    statedTotalWh: reading.statedTotalWh,
    faults: reading.faults,
    keepGoodRows: drafted.keepGoodRows,
    overlap: { sameDays, differentDays },
  };
}

/** What more papers would settle: production for each cycle, and a cycle that is left out. */
function hintsOf(plan: PostingPlan): string[] {
  const hints: string[] = [];
  const inForce = statementsInForce(plan.facts.statements);
  for (const statement of plan.insert) {
    const covered = new Set(
      plan.facts.intervals
        .filter(
          ({ channel, day }) =>
            (channel === 'production' || channel === 'monitor') && day >= statement.from && day < statement.to,
        )
        .map(({ day }) => day),
    ).size;
    const days = daysBetween(statement.from, statement.to);
    const hasRead = statement.productionWh !== null || statement.reads.some((read) => read.channel === 'production');
    if (covered === 0 && !hasRead) hints.push(`No production file covers ${sayCycle(statement)}.`);
    else if (covered > 0 && covered < days) {
      hints.push(`Production data cover ${covered} of the ${days} days of ${sayCycle(statement)}.`);
    }
    const before = inForce.filter((found) => found.to <= statement.from).at(-1);
    if (before !== undefined && before.to < statement.from) {
      hints.push(`No statement covers ${sayCycle({ from: before.to, to: statement.from })}.`);
    }
  }
  return hints;
}

/** The log in progress as it would be checked once posted. */
export function viewDraft(deps: Pick<Deps, 'db' | 'clock'>, actor: Actor): LogDraft {
  const { facts, today } = ledgerOf(deps, actor.householdId);
  const draft = readDraft(deps.db, actor.householdId);
  const plan = planPosting(facts, draft, { name: actor.name, today, now: deps.clock().toISOString() });
  const needsLedger = plan.statements.some((statement) => statement.statementId !== null);
  const cycles = needsLedger ? computeLedger(plan.facts, { today }).cycles : [];
  const cycleOf = (id: string | null) =>
    id === null ? null : (cycles.find((cycle) => cycle.statement.id === id) ?? null);
  const hasSomething = plan.insert.length > 0 || plan.put.length > 0;
  return {
    files: draft.files.map(({ documentId, fileName, table, faults, keepGoodRows }) => ({
      documentId,
      fileName,
      table,
      faults,
      keepGoodRows,
    })),
    statements: plan.statements.map((statement) => draftStatementOf(statement, cycleOf(statement.statementId))),
    readings: plan.readings.map(draftReadingsOf),
    ready: plan.blockers.length === 0 && hasSomething,
    blockers: plan.blockers.map(({ message }) => message),
    hints: hintsOf(plan),
  };
}
