import { asc, eq } from 'drizzle-orm';
import * as z from 'zod/mini';
import { SETUP_STEPS, type SetupStep, type stepState } from '#shared/api/setup.ts';
import type { HouseFacts, MeterFacts, UsageBefore } from '#shared/facts/house.ts';
import { type Assumptions, assumptionsSchema, DEFAULT_ASSUMPTIONS, type PlanInForce } from '#shared/facts/household.ts';
import { ratePlanSchema } from '#shared/settlement/plan.ts';
import { type Opening, openingSchema } from '#shared/settlement/settlement.ts';
import { whSchema } from '#shared/units/energy.ts';
import type { Reader } from '../client.ts';
import { assumptions, households, meters, roofArrays, setupSteps, usageBefore } from '../schema/households.ts';
import { ratePlans } from '../schema/money.ts';

const expectedText = z.array(whSchema);
const channelsText = z.array(z.enum(['import', 'export', 'production']));

export type HouseholdRow = typeof households.$inferSelect;

export function readHouseholdRow(db: Reader, householdId: string): HouseholdRow | null {
  return db.select().from(households).where(eq(households.id, householdId)).get() ?? null;
}

export function readMeters(db: Reader, householdId: string): MeterFacts[] {
  return db
    .select()
    .from(meters)
    .where(eq(meters.householdId, householdId))
    .orderBy(asc(meters.ordinal))
    .all()
    .map((row) => ({
      id: row.id,
      label: row.label,
      channels: channelsText.parse(JSON.parse(row.channels)),
      dials: row.dials,
      multiplier: row.multiplier,
      servicePoint: row.servicePoint,
    }));
}

export function readHouse(db: Reader, row: HouseholdRow): HouseFacts {
  const arrays = db
    .select()
    .from(roofArrays)
    .where(eq(roofArrays.householdId, row.id))
    .orderBy(asc(roofArrays.ordinal))
    .all();
  return {
    name: row.name,
    place: row.place,
    utility: row.utility,
    timeZone: row.timeZone,
    latitude: row.latitude,
    longitude: row.longitude,
    switchOn: row.switchOn,
    arrays: arrays.map(({ id, label, modules, moduleWatts, tiltDegrees, facingDegrees }) => ({
      id,
      label,
      modules,
      moduleWatts,
      tiltDegrees,
      facingDegrees,
    })),
    inverterAcWatts: row.inverterAcWatts,
    expectedMonthlyWh: row.expectedMonthlyWh === null ? null : expectedText.parse(JSON.parse(row.expectedMonthlyWh)),
    meters: readMeters(db, row.id),
    aggregation: row.aggregation,
  };
}

export function readOpening(row: HouseholdRow): Opening {
  return openingSchema.parse(JSON.parse(row.opening));
}

export function readPlans(db: Reader, householdId: string): PlanInForce[] {
  return db
    .select()
    .from(ratePlans)
    .where(eq(ratePlans.householdId, householdId))
    .orderBy(asc(ratePlans.fromDay))
    .all()
    .map((row) => ({
      from: row.fromDay,
      plan: ratePlanSchema.parse(JSON.parse(row.plan)),
      withoutRoof: row.withoutRoof === null ? null : ratePlanSchema.parse(JSON.parse(row.withoutRoof)),
    }));
}

export function readUsageBefore(db: Reader, householdId: string): UsageBefore[] {
  return db
    .select({ from: usageBefore.fromDay, to: usageBefore.toDay, importWh: usageBefore.importWh })
    .from(usageBefore)
    .where(eq(usageBefore.householdId, householdId))
    .orderBy(asc(usageBefore.fromDay))
    .all();
}

export function readAssumptions(db: Reader, householdId: string): Assumptions {
  const row = db.select().from(assumptions).where(eq(assumptions.householdId, householdId)).get();
  if (row === undefined) return DEFAULT_ASSUMPTIONS;
  const { householdId: _, more, ...stated } = row;
  return assumptionsSchema.parse({ ...JSON.parse(more), ...stated });
}

/** Every step of the set-up in order; one without a row is open. */
export function readSteps(db: Reader, householdId: string): z.infer<typeof stepState>[] {
  const rows = db.select().from(setupSteps).where(eq(setupSteps.householdId, householdId)).all();
  const states = new Map(rows.map((row) => [row.step, row.state]));
  return SETUP_STEPS.map((step: SetupStep) => ({ step, state: states.get(step) ?? 'open' }));
}
