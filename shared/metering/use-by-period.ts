import { sameCells } from '../settlement/calendar.ts';
import type { PlanCalendar } from '../settlement/plan.ts';
import type { Day } from '../units/day.ts';
import { type EnergySplit, type Shares, splitEnergy } from './energy-split.ts';
import { cellsOf, hoursBetween, periodHours, weighHours } from './period-hours.ts';
import { STATED_SUN, STATED_USE } from './stated-profile.ts';

/** What is known of a cycle's use: how it fell on the periods of the plan it was billed by, and its energies in Wh. */
export type KnownUse = {
  split: EnergySplit | null;
  calendar: PlanCalendar;
  energy: { importWh: number; exportWh: number; productionWh: number } | null;
};

/**
 * A cycle's use by the periods of a calendar, in Wh by period id; a period without hours in it is left out. What is bought and what the roof feeds the house go by the
 * readings where they tell, else by a stated shape of the day (ledger.md §5.1): then it is `estimated`. Null where the calendar has no periods, or hours in none.
 */
export function useByPeriod(
  calendar: PlanCalendar,
  span: { from: Day; to: Day },
  useWh: number,
  known: KnownUse,
): { byPeriod: Record<string, number>; estimated: boolean } | null {
  const hours = calendar.periods.length === 0 ? null : periodHours(calendar, span.from, span.to);
  if (hours === null) return null;
  const flat = weighHours(hours, hoursBetween(0, 0));
  const split = sameCells(known.calendar, calendar) ? known.split : null;
  const measured = (values: readonly number[] | null | undefined) =>
    values?.some((value) => value > 0) ? values.map((value) => Math.max(0, value)) : null;
  const self = measured(split?.selfWh);
  const none = flat.map(() => 0);
  const shares: Shares = {
    present: flat.map((minutes) => minutes > 0),
    import: measured(split?.importWh),
    export: flat,
    self: self ?? weighHours(hours, STATED_SUN),
    use: weighHours(hours, STATED_USE),
    cancels: { hour: none, '15min': none },
  };
  const energy = known.energy ?? { importWh: useWh, exportWh: 0, productionWh: 0 };
  const parts = splitEnergy({ ...energy, useWh }, shares).useWh;
  const byPeriod: Record<string, number> = {};
  for (const [at, id] of cellsOf(calendar).entries()) {
    const part = Number(parts[at]);
    if (id !== null && (shares.present[at] || part !== 0)) byPeriod[id] = part;
  }
  const fromRoof = useWh - energy.importWh;
  return { byPeriod, estimated: shares.import === null || (self === null && fromRoof !== 0) };
}
