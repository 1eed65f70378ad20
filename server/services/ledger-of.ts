import { eq } from 'drizzle-orm';
import type { HouseholdFacts } from '#shared/facts/household.ts';
import { computeLedger } from '#shared/ledger/compute-ledger.ts';
import type { Ledger } from '#shared/ledger/ledger.ts';
import type { Day } from '#shared/units/day.ts';
import { dayIn } from '../clock.ts';
import type { Db } from '../db/client.ts';
import type { HouseholdRow } from '../db/facts/read-house.ts';
import { households } from '../db/schema/households.ts';
import type { Deps } from '../deps.ts';
import { loadFacts } from './load-facts.ts';

export type HouseholdLedger = { row: HouseholdRow; facts: HouseholdFacts; today: Day; ledger: Ledger };

/** Households whose ledger is kept in memory; the one not asked for longest goes first. */
const REMEMBERED = 50;

const remembered = new WeakMap<Db, Map<string, HouseholdLedger>>();

/**
 * The household's facts and the ledger computed from them for today in its time zone. Remembered until the household's version or the day
 * changes. Throws when there is no such household: the caller has checked the membership.
 */
export function ledgerOf({ db, clock }: Pick<Deps, 'db' | 'clock'>, householdId: string): HouseholdLedger {
  let cache = remembered.get(db);
  if (!cache) {
    cache = new Map();
    remembered.set(db, cache);
  }
  const known = cache.get(householdId);
  if (known) {
    const now = db.select({ version: households.version }).from(households).where(eq(households.id, householdId)).get();
    if (now?.version === known.row.version && dayIn(known.row.timeZone, clock()) === known.today) {
      cache.delete(householdId);
      cache.set(householdId, known);
      return known;
    }
  }
  const loaded = loadFacts(db, householdId);
  if (loaded === null) throw new Error(`no household ${householdId}`);
  const today = dayIn(loaded.row.timeZone, clock());
  const made = { ...loaded, today, ledger: computeLedger(loaded.facts, { today }) };
  cache.delete(householdId);
  cache.set(householdId, made);
  const oldest = cache.keys().next();
  if (cache.size > REMEMBERED && !oldest.done) cache.delete(oldest.value);
  return made;
}
