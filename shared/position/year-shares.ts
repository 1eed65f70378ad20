import type { EnergySplit, Shares } from '../metering/energy-split.ts';
import type { HourlyProfile } from '../metering/hourly-profile.ts';
import { cellsOf, hoursBetween, periodHours, weighHours } from '../metering/period-hours.ts';
import { STATED_SUN, STATED_USE } from '../metering/stated-profile.ts';
import { sameCells } from '../settlement/calendar.ts';
import { keptAt } from '../settlement/place.ts';
import type { PlanCalendar } from '../settlement/plan.ts';
import { planFor } from '../settlement/plan-in-force.ts';
import { type Day, monthOf } from '../units/day.ts';
import type { EnergyCycle, ProjectionBasis } from './basis.ts';
import { gather, type Heap, type Heaps, monthOfAll, segmentsOf, wholeYear } from './month-heaps.ts';

/** Where shares come from: cycles split by these very periods, the mean day of the readings, or a stated shape. */
export type ShareSource = 'record' | 'hours' | 'stated';

export type SourcedShares = {
  shares: Shares;
  source: ShareSource;
  /** False where what the roof feeds the house directly is shared by the stated shape of the sun. */
  hasSelf: boolean;
  /** What cancels inside an hour and a quarter-hour is known. */
  cancelsKnown: Record<'hour' | '15min', boolean>;
};

/** Shares for a span of days by a calendar; `drawn` where the span is as one cycle was. Null where an hour lies in no period. */
export type ShareBook = {
  at: (calendar: PlanCalendar, from: Day, to: Day, drawn?: EnergyCycle | null) => SourcedShares | null;
};

const MILLION = 1_000_000;
const BLOCKS = ['hour', '15min'] as const;
type Block = (typeof BLOCKS)[number];
const EVERY_HOUR = hoursBetween(0, 0);

/** The shares of a basis. The same calendar object and calendar month are worked out once. */
export function shareBook(
  basis: Pick<ProjectionBasis, 'cycles' | 'hourly'> & { facts: Pick<ProjectionBasis['facts'], 'plans'> },
): ShareBook {
  const byCalendar = new Map<PlanCalendar, { record: SplitRecord; known: Map<string, SourcedShares | null> }>();
  const isOf = (cycle: EnergyCycle, calendar: PlanCalendar) => {
    const own = planFor(basis.facts.plans, cycle.from)?.plan.calendar;
    return own !== undefined && sameCells(own, calendar);
  };
  return {
    at: (calendar, from, to, drawn = null) => {
      let of = byCalendar.get(calendar);
      if (!of) {
        of = {
          record: recordOf(
            basis.cycles.filter((cycle) => isOf(cycle, calendar)),
            cellsOf(calendar).length,
          ),
          known: new Map(),
        };
        byCalendar.set(calendar, of);
      }
      const key = `${from.slice(5)} ${to.slice(5)} ${drawn?.from ?? ''}`;
      const known = of.known.get(key);
      if (known !== undefined) return known;
      const own = drawn?.split && isOf(drawn, calendar) ? recordOf([drawn], cellsOf(calendar).length) : null;
      const made = sharesOf(basis.hourly, calendar, from, to, of.record, own);
      of.known.set(key, made);
      return made;
    },
  };
}

type Flow = 'import' | 'export' | 'self';

/** Wh of each cell by calendar month, and what cancelled of the lesser of import and export. */
type SplitRecord = {
  flows: Record<Flow, Heaps[]>;
  cancels: Record<Block, { gone: Heaps[]; lesser: Heaps[] }>;
};

function recordOf(cycles: readonly EnergyCycle[], cells: number): SplitRecord {
  const heaps = (): Heaps[] => Array.from({ length: cells }, () => new Map());
  const record: SplitRecord = {
    flows: { import: heaps(), export: heaps(), self: heaps() },
    cancels: { hour: { gone: heaps(), lesser: heaps() }, '15min': { gone: heaps(), lesser: heaps() } },
  };
  for (const { from, to, split } of cycles) {
    if (split === null) continue;
    const segments = segmentsOf(from, to);
    const add = (into: readonly Heaps[], values: readonly number[]) => {
      for (const [cell, heap] of into.entries()) gather(heap, 0, segments, Number(values[cell]));
    };
    add(record.flows.import, split.importWh);
    add(record.flows.export, split.exportWh);
    if (split.selfWh !== null) add(record.flows.self, split.selfWh);
    for (const block of BLOCKS) {
      const gone = split.cancels[block];
      if (gone === null) continue;
      add(record.cancels[block].gone, gone);
      add(record.cancels[block].lesser, lesserOf(split));
    }
  }
  return record;
}

function lesserOf({ importWh, exportWh }: EnergySplit): number[] {
  return importWh.map((bought, at) => Math.min(bought, Number(exportWh[at])));
}

function sharesOf(
  hourly: HourlyProfile | null,
  calendar: PlanCalendar,
  from: Day,
  to: Day,
  record: SplitRecord,
  drawn: SplitRecord | null,
): SourcedShares | null {
  const hours = periodHours(calendar, from, to);
  if (hours === null) return null;
  const month = monthOf(from) - 1;
  const flat = weighHours(hours, EVERY_HOUR);
  const present = flat.map((minutes) => minutes > 0);
  const shape = hourly?.months[month] ?? null;
  const within = (weights: readonly number[] | null): readonly number[] | null => {
    const held = weights?.map((weight, cell) => (present[cell] ? Math.max(0, weight) : 0)) ?? [];
    return held.some((weight) => weight > 0) ? held : null;
  };
  const recorded = (flow: Flow) =>
    within(drawn?.flows[flow].map((heaps) => wholeYear(heaps).energy) ?? null) ??
    within(record.flows[flow].map((heaps) => monthOfAll(heaps, month).energy));
  const byHour = (flow: Flow) => {
    const ofFlow = shape?.[flow] ?? null;
    return ofFlow === null ? null : within(weighHours(hours, ofFlow));
  };

  const own = { import: recorded('import'), export: recorded('export'), self: recorded('self') };
  const importing = own.import ?? byHour('import');
  const exporting = own.export ?? byHour('export');
  const self = own.self ?? byHour('self');
  const sun = weighHours(hours, STATED_SUN);
  const stretches = BLOCKS.map((block) => cancelsOf(block, month, record, drawn, hourly));
  const [hour, quarter] = stretches;
  const none = flat.map(() => 0);
  return {
    shares: {
      present,
      import: importing,
      export: exporting ?? sun,
      self: self ?? sun,
      use: weighHours(hours, STATED_USE),
      cancels: { hour: hour ?? none, '15min': quarter ?? none },
    },
    source: importing === null || exporting === null ? 'stated' : own.import && own.export ? 'record' : 'hours',
    hasSelf: self !== null,
    cancelsKnown: { hour: Boolean(hour), '15min': Boolean(quarter) },
  };
}

/** Millionths that cancel in each cell: the cycle's own, the same month's, the whole record's, else the readings'; null where nothing tells. */
function cancelsOf(
  block: Block,
  month: number,
  record: SplitRecord,
  drawn: SplitRecord | null,
  hourly: HourlyProfile | null,
): number[] | null {
  const of = ({ gone, lesser }: SplitRecord['cancels'][Block], sum: (heaps: Heaps) => Heap): number[] | null => {
    const known = lesser.map(sum);
    if (known.every((heap) => heap.days === 0)) return null;
    return known.map((heap, cell) => {
      const cancelled = sum(keptAt(gone, cell)).energy;
      return heap.energy <= 0 ? 0 : Math.round((cancelled * MILLION) / heap.energy);
    });
  };
  const read = hourly?.cancels[block]?.[month];
  return (
    (drawn && of(drawn.cancels[block], wholeYear)) ??
    of(record.cancels[block], (heaps) => monthOfAll(heaps, month)) ??
    of(record.cancels[block], wholeYear) ??
    (read === undefined ? null : record.flows.import.map(() => read))
  );
}
