import type { ProductionMapping } from '#shared/api/log.ts';
import { dcWattsOf } from '#shared/facts/dc-rating.ts';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import type { IntervalChannel } from '#shared/facts/papers.ts';
import { fail, type Result, succeed } from '#shared/problem.ts';
import { isTimeZone } from '../../clock.ts';
import { readDocumentBytes } from '../../db/documents.ts';
import { readDraft } from '../../db/drafts.ts';
import { insertDocument } from '../../db/facts/write-papers.ts';
import { putDraftReading } from '../../db/write-drafts.ts';
import type { Actor, Deps } from '../../deps.ts';
import { newId } from '../../ids.ts';
import type { FileInput, ProductionContext } from '../../importers/contract.ts';
import { readProductionCsv } from '../../importers/production-csv.ts';
import { fieldFault } from '../field-fault.ts';
import { ledgerOf } from '../ledger-of.ts';
import { writeDraft } from '../write-household.ts';
import { alreadyHere, newDocument } from './held-file.ts';

type LogDeps = Pick<Deps, 'db' | 'clock'>;

function contextOf(
  { house }: HouseholdFacts,
  channel: IntervalChannel,
  mapping: ProductionMapping | null,
): ProductionContext {
  const dcWatts = dcWattsOf(house.arrays);
  return {
    mapping,
    channel,
    timeZone: house.timeZone,
    acWatts: house.inverterAcWatts,
    dcWatts: dcWatts === 0 ? null : dcWatts,
  };
}

/**
 * Reads a production, import or export file into the log and keeps its bytes at once. A file that is here already is taken again only for
 * a channel that has not been read from it: one file may hold what came in and what went out.
 */
export function addProductionFile(
  deps: LogDeps,
  actor: Actor,
  file: FileInput,
  channel: IntervalChannel,
): Result<null> {
  const { facts, today } = ledgerOf(deps, actor.householdId);
  const document = newDocument(deps, actor, file, { kind: 'production', today });
  if (!document.ok) return document;
  const here = alreadyHere(deps, actor, document.value);
  if (here !== null) {
    const { twin, refusal } = here;
    const drafted = readDraft(deps.db, actor.householdId).readings;
    const readBefore =
      drafted.some((reading) => reading.documentId === twin.id && reading.channel === channel) ||
      facts.intervals.some((interval) => interval.documentId === twin.id && interval.channel === channel);
    if (twin.kind !== 'production' || readBefore) return refusal;
  }
  const reading = readProductionCsv(file, contextOf(facts, channel, null));
  if (!reading.ok) return reading;
  const documentId = here?.twin.id ?? document.value.id;
  return writeDraft(deps, (tx) => {
    if (here === null) insertDocument(tx, actor.householdId, { ...document.value, state: 'held' });
    putDraftReading(tx, actor.householdId, {
      key: newId(),
      documentId,
      channel: reading.value.mapping.channel,
      keepGoodRows: false,
      reading: reading.value,
    });
    return succeed(null);
  });
}

/** Reads a file of the log again as the owner says it is to be read. */
export function changeMapping(deps: LogDeps, actor: Actor, key: string, mapping: ProductionMapping): Result<null> {
  if (!isTimeZone(mapping.timeZone)) {
    return fail('invalid-fields', null, [fieldFault('timeZone', 'Choose a time zone such as America/New_York.')]);
  }
  const { facts } = ledgerOf(deps, actor.householdId);
  const drafted = readDraft(deps.db, actor.householdId).readings.find((found) => found.key === key);
  const stored = drafted === undefined ? null : readDocumentBytes(deps.db, actor.householdId, drafted.documentId);
  if (drafted === undefined || stored === null) return fail('not-found', 'This file is not in the log any more.');
  const file = { fileName: stored.fileName, bytes: stored.bytes };
  const reading = readProductionCsv(file, contextOf(facts, mapping.channel, mapping));
  if (!reading.ok) return reading;
  return writeDraft(deps, (tx) => {
    putDraftReading(tx, actor.householdId, { ...drafted, channel: mapping.channel, reading: reading.value });
    return succeed(null);
  });
}
