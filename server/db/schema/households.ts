import { sql } from 'drizzle-orm';
import { check, index, integer, primaryKey, real, sqliteTable, text } from 'drizzle-orm/sqlite-core';
import { centsColumn, dayColumn, flagColumn, isDay, isDecimal, isFlag, whColumn } from './columns.ts';

/** Global: the household itself, with the house it stands for. */
export const households = sqliteTable(
  'households',
  {
    id: text('id').primaryKey(),
    /** Goes up with every write; a ledger is remembered by it. */
    version: integer('version').notNull().default(1),
    createdAt: text('created_at').notNull(),
    sample: flagColumn('sample').notNull().default(false),
    name: text('name').notNull(),
    place: text('place').notNull(),
    utility: text('utility').notNull(),
    timeZone: text('time_zone').notNull(),
    latitude: real('latitude'),
    longitude: real('longitude'),
    switchOn: dayColumn('switch_on'),
    inverterAcWatts: integer('inverter_ac_watts'),
    /** Twelve Wh, January first, as JSON; null when there is no estimate. */
    expectedMonthlyWh: text('expected_monthly_wh'),
    aggregation: text('aggregation', { enum: ['none', 'netTogether', 'share'] })
      .notNull()
      .default('none'),
    /** What the utility's books held before the first cycle, as validated JSON. */
    opening: text('opening').notNull(),
  },
  (table) => [
    check('households_version', sql`${table.version} >= 1`),
    check('households_sample', isFlag(table.sample)),
    check('households_switch_on', isDay(table.switchOn)),
    check('households_latitude', sql`${table.latitude} BETWEEN -90 AND 90`),
    check('households_longitude', sql`${table.longitude} BETWEEN -180 AND 180`),
    check('households_expected', sql`json_array_length(${table.expectedMonthlyWh}) = 12`),
    check('households_opening', sql`json_valid(${table.opening})`),
  ],
);

const householdId = () =>
  text('household_id')
    .notNull()
    .references(() => households.id, { onDelete: 'cascade' });

export const roofArrays = sqliteTable(
  'roof_arrays',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    ordinal: integer('ordinal').notNull(),
    label: text('label').notNull(),
    modules: integer('modules').notNull(),
    moduleWatts: integer('module_watts').notNull(),
    tiltDegrees: integer('tilt_degrees'),
    facingDegrees: integer('facing_degrees'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.id] }),
    check('roof_arrays_modules', sql`${table.modules} BETWEEN 1 AND 500`),
    check('roof_arrays_watts', sql`${table.moduleWatts} BETWEEN 50 AND 1000`),
    check('roof_arrays_tilt', sql`${table.tiltDegrees} BETWEEN 0 AND 90`),
    check('roof_arrays_facing', sql`${table.facingDegrees} BETWEEN 0 AND 359`),
  ],
);

export const meters = sqliteTable(
  'meters',
  {
    householdId: householdId(),
    id: text('id').notNull(),
    ordinal: integer('ordinal').notNull(),
    label: text('label').notNull(),
    /** JSON list of `import`, `export`, `production`. */
    channels: text('channels').notNull(),
    dials: integer('dials').notNull(),
    multiplier: text('multiplier').notNull(),
    servicePoint: text('service_point'),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.id] }),
    check('meters_channels', sql`json_valid(${table.channels})`),
    check('meters_dials', sql`${table.dials} BETWEEN 3 AND 9`),
    check('meters_multiplier', isDecimal(table.multiplier)),
  ],
);

export const usageBefore = sqliteTable(
  'usage_before',
  {
    householdId: householdId(),
    fromDay: dayColumn('from_day').notNull(),
    toDay: dayColumn('to_day').notNull(),
    importWh: whColumn('import_wh').notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.fromDay] }),
    check(
      'usage_before_days',
      sql`${isDay(table.fromDay)} AND ${isDay(table.toDay)} AND ${table.fromDay} < ${table.toDay}`,
    ),
  ],
);

export const assumptions = sqliteTable(
  'assumptions',
  {
    householdId: householdId().primaryKey(),
    degradation: text('degradation').notNull(),
    priceRise: text('price_rise').notNull(),
    horizonMonths: integer('horizon_months').notNull(),
    upkeepYearlyCents: centsColumn('upkeep_yearly_cents').notNull(),
    /** Discount rate and grid factor: validated JSON. */
    more: text('more').notNull().default('{}'),
  },
  (table) => [
    check('assumptions_rates', sql`${isDecimal(table.degradation)} AND ${isDecimal(table.priceRise)}`),
    check('assumptions_horizon', sql`${table.horizonMonths} BETWEEN 12 AND 480`),
    check('assumptions_upkeep', sql`${table.upkeepYearlyCents} >= 0`),
  ],
);

/** A step without a row is open. */
export const setupSteps = sqliteTable(
  'setup_steps',
  {
    householdId: householdId(),
    step: text('step').notNull(),
    state: text('state', { enum: ['done', 'skipped'] }).notNull(),
  },
  (table) => [
    primaryKey({ columns: [table.householdId, table.step] }),
    check('setup_steps_state', sql`${table.state} IN ('done', 'skipped')`),
  ],
);

/** Who did what, when. Names are kept as they were, since a person may leave. */
export const auditEvents = sqliteTable(
  'audit_events',
  {
    id: integer('id').primaryKey({ autoIncrement: true }),
    householdId: householdId(),
    at: text('at').notNull(),
    userId: text('user_id').notNull(),
    byName: text('by_name').notNull(),
    action: text('action').notNull(),
    about: text('about').notNull(),
  },
  (table) => [index('audit_events_household').on(table.householdId, table.id)],
);
