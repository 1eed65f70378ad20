import type { DocumentFacts, IntervalChannel, IntervalDay } from '../facts/papers.ts';
import type { EnergyFigure } from '../ledger/cycle.ts';
import { addDays, type Day, daysBetween } from '../units/day.ts';
import { kwhText, wh } from '../units/energy.ts';
import type { Source } from '../working.ts';
import { input } from './source.ts';

/** Share of the steps from which interval data count as complete: less than one quarter-hour in ten days may be missing. */
export const COMPLETE_COVERAGE = 0.999;

type DaySum = { wh: number; steps: number; missing: number; row: IntervalDay };

/** Interval days by channel and local day, each day added up once. */
export type IntervalIndex = {
  byChannel: ReadonlyMap<IntervalChannel, ReadonlyMap<Day, DaySum>>;
  fileNames: ReadonlyMap<string, string>;
};

/** What interval data say of a cycle. `missingDays` counts days without any reading; `missingSteps` the steps missing on the others. */
export type IntervalReading = {
  figure: EnergyFigure;
  complete: boolean;
  days: number;
  missingDays: number;
  missingSteps: number;
};

export function indexIntervals(days: readonly IntervalDay[], documents: readonly DocumentFacts[]): IntervalIndex {
  const byChannel = new Map<IntervalChannel, Map<Day, DaySum>>();
  for (const row of days) {
    let sum = 0;
    let missing = 0;
    for (const value of row.values) {
      if (value === null) missing += 1;
      else sum += value;
    }
    let channel = byChannel.get(row.channel);
    if (!channel) {
      channel = new Map();
      byChannel.set(row.channel, channel);
    }
    channel.set(row.day, { wh: sum, steps: row.values.length, missing, row });
  }
  return { byChannel, fileNames: new Map(documents.map((document) => [document.id, document.fileName])) };
}

/**
 * Energy of a channel over the local days in `[from, to)` from interval data, with the share of the steps that is present; null when
 * no day of it holds a reading. The sum is of what is present: use it as the cycle's energy only when `complete`.
 */
export function intervalEnergy(
  index: IntervalIndex,
  channel: IntervalChannel,
  from: Day,
  to: Day,
): IntervalReading | null {
  const held = index.byChannel.get(channel);
  if (!held) return null;
  const days = daysBetween(from, to);
  const perDay: string[] = [];
  const documents = new Set<string>();
  let total = 0;
  let present = 0;
  let missingDays = 0;
  let missingSteps = 0;
  for (let at = 0; at < days; at += 1) {
    const found = held.get(addDays(from, at));
    if (!found || found.steps === found.missing) {
      missingDays += 1;
      continue;
    }
    total += found.wh;
    present += (found.steps - found.missing) / found.steps;
    missingSteps += found.missing;
    perDay.push(kwhText(wh(found.wh)));
    if (found.row.documentId !== null) documents.add(found.row.documentId);
  }
  if (perDay.length === 0) return null;
  const coverage = missingDays === 0 && missingSteps === 0 ? 1 : Math.round((present / days) * 10_000) / 10_000;
  const complete = coverage >= COMPLETE_COVERAGE;
  const monitor = channel === 'monitor';
  const what = monitor ? 'monitoring' : 'interval';
  return {
    complete,
    days,
    missingDays,
    missingSteps,
    figure: {
      wh: wh(total),
      from: monitor ? 'monitor' : 'intervals',
      coverage,
      working: {
        words:
          missingDays === 0 && missingSteps === 0
            ? `Sum of ${days} days of ${what} data`
            : `Sum of the ${what} data present: ${days - missingDays} of ${days} days${missingSteps > 0 ? `, ${missingSteps} readings missing` : ''}`,
        formula: 'sum(days)',
        inputs: [input('days', `${channel} by day`, perDay, 'kWh', fileSource(index, documents, from, to))],
        unit: 'kWh',
        basis: 'metered',
      },
    },
  };
}

/** The interval data of one day, for those who need the steps; null when there are none. */
export function intervalDayOf(index: IntervalIndex, channel: IntervalChannel, day: Day): IntervalDay | null {
  return index.byChannel.get(channel)?.get(day)?.row ?? null;
}

function fileSource(index: IntervalIndex, documents: ReadonlySet<string>, from: Day, to: Day): Source {
  const [first] = documents;
  if (first === undefined) return { kind: 'figure', name: 'interval data' };
  const more = documents.size > 1 ? ` and ${documents.size - 1} more` : '';
  return {
    kind: 'document',
    documentId: first,
    fileName: `${index.fileNames.get(first) ?? first}${more}`,
    place: `days ${from} to ${addDays(to, -1)}`,
  };
}
