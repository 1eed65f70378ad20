import { addDays, type Day, dayFromNumber } from '../units/day.ts';
import { periodAt } from './calendar.ts';
import type { NettedFlow } from './cycle-flows.ts';
import type { RatePlan } from './plan.ts';
import { refuse } from './refused.ts';
import type { CycleUsage } from './settlement.ts';

const MS_PER_MINUTE = 60_000;
const MS_PER_DAY = 86_400_000;

type Intervals = NonNullable<CycleUsage['intervals']>;

/** Interval data with each step's local day, period and offset from UTC. */
export type IntervalView = {
  data: Intervals;
  startMs: number;
  days: Day[];
  periods: (string | null)[];
  offsetsMs: number[];
};

export function intervalView(data: Intervals, plan: RatePlan): IntervalView {
  const startMs = Date.parse(data.startUtc);
  if (Number.isNaN(startMs) || !(data.minutes > 0)) refuse('The interval data have no readable start or step.');
  if (data.importWh.length !== data.exportWh.length) refuse('Import and export intervals are not of the same number.');
  const view: IntervalView = { data, startMs, days: [], periods: [], offsetsMs: [] };
  const offsetAt = offsetOf(plan.timeZone);
  let number = Number.NaN;
  let date = dayFromNumber(0);
  for (let at = 0; at < data.importWh.length; at += 1) {
    const instant = startMs + at * data.minutes * MS_PER_MINUTE;
    const offset = offsetAt(instant);
    const local = instant + offset;
    const localDay = Math.floor(local / MS_PER_DAY);
    if (localDay !== number) {
      number = localDay;
      date = dayFromNumber(localDay);
    }
    const minute = Math.floor((local - localDay * MS_PER_DAY) / MS_PER_MINUTE);
    view.days.push(date);
    view.offsetsMs.push(offset);
    view.periods.push(plan.calendar.periods.length === 0 ? null : periodAt(plan.calendar, date, minute));
  }
  return view;
}

const clocks = new Map<string, Intl.DateTimeFormat>();

function clockOf(timeZone: string): Intl.DateTimeFormat {
  const known = clocks.get(timeZone);
  if (known) return known;
  const made = new Intl.DateTimeFormat('en-US', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  });
  clocks.set(timeZone, made);
  return made;
}

/**
 * Offsets from UTC in milliseconds. A zone's clock is asked at both ends of a UTC day, and inside it only where they differ: then once per
 * quarter-hour (no zone changes its clock inside one, and none changes it there and back in a day).
 */
function offsetOf(timeZone: string): (instant: number) => number {
  const clock = clockOf(timeZone);
  const ask = (instant: number): number => {
    const parts = new Map(clock.formatToParts(instant).map((part) => [part.type, Number(part.value)]));
    const part = (name: Intl.DateTimeFormatPartTypes) => Number(parts.get(name));
    const shown = Date.UTC(part('year'), part('month') - 1, part('day'), part('hour'), part('minute'), part('second'));
    return shown - Math.floor(instant / 1000) * 1000;
  };
  let stretch = Number.NaN;
  let ends = { first: 0, last: 0 };
  let quarter = Number.NaN;
  let offset = 0;
  return (instant) => {
    const found = Math.floor(instant / MS_PER_DAY);
    if (found !== stretch) {
      ends = {
        first: found === stretch + 1 ? ends.last : ask(found * MS_PER_DAY),
        last: ask((found + 1) * MS_PER_DAY),
      };
      stretch = found;
    }
    if (ends.first === ends.last) return ends.first;
    const step = Math.floor(instant / (15 * MS_PER_MINUTE));
    if (step !== quarter) {
      quarter = step;
      offset = ask(instant);
    }
    return offset;
  };
}

/**
 * Import and export in Wh over the steps whose local day lies in `[from, to)` (null: all), netted in each clock block of local time.
 * A clock hour that comes twice when daylight saving time ends is two blocks. A block belongs to the day and period it begins in.
 */
export function nettedOver(
  view: IntervalView,
  netting: 'none' | '15min' | 'hour',
  from: Day | null,
  to: Day | null,
): NettedFlow {
  const { data } = view;
  const blockMinutes = netting === 'none' ? data.minutes : netting === 'hour' ? 60 : 15;
  if (data.minutes > blockMinutes)
    refuse(`The plan nets by blocks of ${blockMinutes} minutes; the data have steps of ${data.minutes}.`);
  const flow: NettedFlow = { import: 0, export: 0, byPeriod: null };
  const byPeriod: NonNullable<NettedFlow['byPeriod']> = {};
  const blockMs = blockMinutes * MS_PER_MINUTE;
  let at = 0;
  while (at < data.importWh.length) {
    const first = at;
    const block = blockAt(view, at, blockMs);
    let bought = 0;
    let sent = 0;
    do {
      bought += Number(data.importWh[at]);
      sent += Number(data.exportWh[at]);
      at += 1;
    } while (netting !== 'none' && at < data.importWh.length && blockAt(view, at, blockMs) === block);
    const date = view.days[first];
    if (date === undefined || (from !== null && date < from) || (to !== null && date >= to)) continue;
    if (netting !== 'none') [bought, sent] = [Math.max(bought - sent, 0), Math.max(sent - bought, 0)];
    flow.import += bought;
    flow.export += sent;
    const period = view.periods[first];
    if (period === null || period === undefined) continue;
    const part = byPeriod[period] ?? { import: 0, export: 0 };
    part.import += bought;
    part.export += sent;
    byPeriod[period] = part;
  }
  const gap = view.periods.some((period) => period === null);
  return { ...flow, byPeriod: gap ? null : byPeriod };
}

/** The clock block of a step, counted from 1970 in the zone's own minutes past the hour. */
function blockAt(view: IntervalView, at: number, blockMs: number): number {
  const instant = view.startMs + at * view.data.minutes * MS_PER_MINUTE;
  const shift = Number(view.offsetsMs[at]) % blockMs;
  return Math.floor((instant + shift) / blockMs);
}

/** Production in Wh over the steps whose local day lies in `[from, to)`, in all and by period. */
export function producedOver(
  view: IntervalView,
  from: Day,
  to: Day,
): { total: number; byPeriod: Record<string, number> } {
  const { data } = view;
  if (data.productionWh.length !== data.importWh.length)
    refuse('The plan needs interval data of production for this cycle.');
  const made = { total: 0, byPeriod: {} as Record<string, number> };
  for (const [at, date] of view.days.entries()) {
    if (date < from || date >= to) continue;
    const value = Number(data.productionWh[at]);
    made.total += value;
    const period = view.periods[at];
    if (period) addTo(made.byPeriod, period, value);
  }
  return made;
}

export function addTo(sums: Record<string, number>, name: string, value: number): void {
  sums[name] = (sums[name] ?? 0) + value;
}

/** Refused unless the steps reach from the cycle's first day through its last: a gap would be taken for no use. */
export function mustCover(view: IntervalView, from: Day, to: Day): void {
  if (view.days[0] !== from || view.days.at(-1) !== addDays(to, -1))
    refuse('The interval data do not cover the whole cycle.');
}
