import { type SQL, sql } from 'drizzle-orm';
import { type AnySQLiteColumn, integer, text } from 'drizzle-orm/sqlite-core';
import type { Cents } from '#shared/units/cents.ts';
import type { Day } from '#shared/units/day.ts';
import type { Wh } from '#shared/units/energy.ts';

/** A civil date as text. */
export const dayColumn = (name: string) => text(name).$type<Day>();

/** Whole cents. */
export const centsColumn = (name: string) => integer(name).$type<Cents>();

/** Whole watt-hours. */
export const whColumn = (name: string) => integer(name).$type<Wh>();

export const flagColumn = (name: string) => integer(name, { mode: 'boolean' });

/** True for a date-shaped text; null passes, as in any CHECK. */
export function isDay(column: AnySQLiteColumn): SQL {
  return sql`${column} GLOB '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]'`;
}

/** True for a plain decimal text: digits, one point, a leading minus; null passes. */
export function isDecimal(column: AnySQLiteColumn): SQL {
  return sql`(${column} GLOB '[0-9]*' OR ${column} GLOB '-[0-9]*') AND ${column} NOT GLOB '*[^0-9.-]*'`;
}

export function isFlag(column: AnySQLiteColumn): SQL {
  return sql`${column} IN (0, 1)`;
}
