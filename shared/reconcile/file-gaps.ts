import type { IntervalChannel } from '../facts/papers.ts';
import { sayCount, sayDay } from '../ledger/say.ts';
import { asksForIntervals } from '../metering/cycle-intervals.ts';
import type { IntervalReading } from '../metering/interval-index.ts';
import { addDays, type Day } from '../units/day.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareText, nothingToCompare } from './make-check.ts';

const FILES: Record<IntervalChannel, string> = {
  import: 'import file',
  export: 'export file',
  production: 'production file',
  monitor: 'monitoring file',
};
/** So many stretches of days are named before "and more". */
const NAMED = 3;

/**
 * Whether each interval file of the cycle has a reading for every step. A gap differs only where a figure of this cycle hangs on the file: import and export
 * where the plan nets or prices inside the cycle, production (failing a file of it, the monitoring) where no register gives it. Elsewhere it is said
 * and compared with nothing. A file that does not exist is asked for only where something hangs on it.
 */
export function fileGapsChecks(context: CheckContext): Check[] {
  const channels: IntervalChannel[] = ['import', 'export', 'production', 'monitor'];
  return channels.map((channel) => gapsCheck(context, channel)).filter((check) => check !== null);
}

function gapsCheck(context: CheckContext, channel: IntervalChannel): Check | null {
  const { paper, index, metered } = context;
  const title = `No gaps in the ${FILES[channel]}`;
  const seen = channel === 'monitor' ? metered.monitor : metered.witnesses[channel].intervals;
  const need = needOf(context, channel);
  if (seen === null) {
    if (need === null || (channel === 'monitor' && index.byChannel.get('monitor') === undefined)) return null;
    return nothingToCompare('fileGaps', channel, 'days', {
      title,
      stated: String(paper.days),
      cause: `There is no ${FILES[channel]} for these days, and ${need}.`,
      advice: `Upload the ${FILES[channel]} for ${sayDay(paper.from)} to ${sayDay(addDays(paper.to, -1))}.`,
    });
  }
  const whole = seen.days - gapDays(context, channel).length;
  const sides = {
    stated: String(seen.days),
    found: String(whole),
    difference: String(seen.days - whole),
    unit: 'days' as const,
  };
  const texts = gapTexts(context, channel, seen, need);
  if (need === null && whole < seen.days) {
    return nothingToCompare('fileGaps', channel, 'days', {
      title,
      stated: sides.stated,
      found: sides.found,
      ...texts,
    });
  }
  return compareText('fileGaps', channel, title, sides, () => texts);
}

/** Why a figure of the cycle hangs on the file, as the end of a sentence; null where none does. */
function needOf({ settled, metered, facts }: CheckContext, channel: IntervalChannel): string | null {
  if (channel === 'import' || channel === 'export') {
    return settled.plan !== null && asksForIntervals(settled.plan.plan)
      ? 'the rate plan nets or prices inside the cycle'
      : null;
  }
  const { register, printed, intervals } = metered.witnesses.production;
  if (register !== null || printed !== null) return null;
  const fileHere = intervals !== null;
  if (channel === 'monitor' ? fileHere : !fileHere && metered.monitor !== null) return null;
  return facts.incentive === null
    ? 'self-use is worked out from it'
    : 'self-use and the incentive are worked out from it';
}

/** The days on which a reading is missing. */
function gapDays({ paper, index }: CheckContext, channel: IntervalChannel): Day[] {
  const days: Day[] = [];
  for (let at = 0; at < paper.days; at += 1) {
    const date = addDays(paper.from, at);
    const held = index.byChannel.get(channel)?.get(date);
    if (held === undefined || held.missing > 0) days.push(date);
  }
  return days;
}

function gapTexts(
  context: CheckContext,
  channel: IntervalChannel,
  seen: IntervalReading,
  need: string | null,
): { cause: string; advice: string } {
  const gaps = gapDays(context, channel);
  const parts = [
    seen.missingDays > 0 ? sayCount(seen.missingDays, 'whole day', 'whole days') : null,
    seen.missingSteps > 0 ? sayCount(seen.missingSteps, 'reading', 'readings') : null,
  ].filter((part) => part !== null);
  const lacks = `The ${FILES[channel]} lacks ${parts.join(' and ')}: ${stretches(gaps)}`;
  return need === null
    ? {
        cause: `${lacks}. No figure of this cycle hangs on it.`,
        advice: 'A later download may hold what is missing; upload it to fill the gap.',
      }
    : {
        cause: `${lacks}; ${need}.`,
        advice: 'Download those days again and upload them, or ask who keeps the meter for them.',
      };
}

/** "3 Nov to 14 Nov, 2 Dec", the first few. */
function stretches(days: readonly Day[]): string {
  const found: { first: Day; last: Day }[] = [];
  for (const date of days) {
    const open = found.at(-1);
    if (open !== undefined && addDays(open.last, 1) === date) open.last = date;
    else found.push({ first: date, last: date });
  }
  const said = found
    .slice(0, NAMED)
    .map(({ first, last }) => (first === last ? sayDay(first) : `${sayDay(first)} to ${sayDay(last)}`));
  return found.length > NAMED ? `${said.join(', ')} and more` : said.join(', ');
}
