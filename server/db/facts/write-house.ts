import { eq } from 'drizzle-orm';
import type { SetupStep } from '#shared/api/setup.ts';
import type { HouseFacts, UsageBefore } from '#shared/facts/house.ts';
import type { Assumptions, PlanInForce } from '#shared/facts/household.ts';
import type { Opening } from '#shared/settlement/settlement.ts';
import type { Reader } from '../client.ts';
import { assumptions, households, meters, roofArrays, setupSteps, usageBefore } from '../schema/households.ts';
import { ratePlans } from '../schema/money.ts';

type HouseFields = Partial<Omit<HouseFacts, 'arrays' | 'meters' | 'expectedMonthlyWh'>>;

export function insertHousehold(
  db: Reader,
  row: { id: string; createdAt: string; sample: boolean; house: HouseFacts; opening: Opening },
): void {
  const { arrays, meters: meterList, expectedMonthlyWh, ...house } = row.house;
  db.insert(households)
    .values({
      id: row.id,
      createdAt: row.createdAt,
      sample: row.sample,
      ...house,
      expectedMonthlyWh: expectedMonthlyWh === null ? null : JSON.stringify(expectedMonthlyWh),
      opening: JSON.stringify(row.opening),
    })
    .run();
  const { inverterAcWatts, aggregation } = house;
  replaceRoof(db, row.id, { arrays, meters: meterList, inverterAcWatts, expectedMonthlyWh, aggregation });
}

export function updateHouse(db: Reader, householdId: string, fields: HouseFields): void {
  db.update(households).set(fields).where(eq(households.id, householdId)).run();
}

export function replaceRoof(
  db: Reader,
  householdId: string,
  roof: Pick<HouseFacts, 'arrays' | 'meters' | 'inverterAcWatts' | 'expectedMonthlyWh' | 'aggregation'>,
): void {
  db.update(households)
    .set({
      inverterAcWatts: roof.inverterAcWatts,
      aggregation: roof.aggregation,
      expectedMonthlyWh: roof.expectedMonthlyWh === null ? null : JSON.stringify(roof.expectedMonthlyWh),
    })
    .where(eq(households.id, householdId))
    .run();
  db.delete(roofArrays).where(eq(roofArrays.householdId, householdId)).run();
  for (const [ordinal, array] of roof.arrays.entries()) {
    db.insert(roofArrays)
      .values({ householdId, ordinal, ...array })
      .run();
  }
  db.delete(meters).where(eq(meters.householdId, householdId)).run();
  for (const [ordinal, meter] of roof.meters.entries()) {
    db.insert(meters)
      .values({ householdId, ordinal, ...meter, channels: JSON.stringify(meter.channels) })
      .run();
  }
}

export function replacePlans(db: Reader, householdId: string, plans: readonly PlanInForce[], opening: Opening): void {
  db.delete(ratePlans).where(eq(ratePlans.householdId, householdId)).run();
  for (const { from, plan, withoutRoof } of plans) {
    db.insert(ratePlans)
      .values({
        householdId,
        fromDay: from,
        plan: JSON.stringify(plan),
        withoutRoof: withoutRoof === null ? null : JSON.stringify(withoutRoof),
      })
      .run();
  }
  db.update(households)
    .set({ opening: JSON.stringify(opening) })
    .where(eq(households.id, householdId))
    .run();
}

export function replaceUsageBefore(db: Reader, householdId: string, rows: readonly UsageBefore[]): void {
  db.delete(usageBefore).where(eq(usageBefore.householdId, householdId)).run();
  for (const { from, to, importWh } of rows) {
    db.insert(usageBefore).values({ householdId, fromDay: from, toDay: to, importWh }).run();
  }
}

export function writeAssumptions(db: Reader, householdId: string, stated: Assumptions): void {
  const { discountRate, grid, ...columns } = stated;
  const values = { ...columns, more: JSON.stringify({ discountRate, grid }) };
  db.insert(assumptions)
    .values({ householdId, ...values })
    .onConflictDoUpdate({ target: assumptions.householdId, set: values })
    .run();
}

export function writeStep(db: Reader, householdId: string, step: SetupStep, state: 'done' | 'skipped'): void {
  db.insert(setupSteps)
    .values({ householdId, step, state })
    .onConflictDoUpdate({ target: [setupSteps.householdId, setupSteps.step], set: { state } })
    .run();
}
