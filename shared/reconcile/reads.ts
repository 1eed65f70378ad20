import type { RegisterRead, Statement } from '../facts/papers.ts';
import { sayDate, sayDay } from '../ledger/say.ts';
import { closesEstimated, runKey } from '../metering/estimated-reads.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareDecimals, compareText, nothingToCompare } from './make-check.ts';

const CHANNELS = ['import', 'export', 'production'] as const;
const CHANNEL_WORDS = { import: 'Import', export: 'Export', production: 'Production' };

/**
 * Each register begins where it ended: the previous read of a meter is its current read on the statement before; a meter that is new there begins
 * on the day the old one ended (net-metering.md §4 "read continuity", "meter exchange").
 */
export function registersFollowChecks({ paper }: CheckContext): Check[] {
  const checks: Check[] = [];
  for (const channel of CHANNELS) {
    const reads = byDate(readsOf(paper.statement, channel));
    const before = byDate(readsOf(paper.previous, channel));
    reads.forEach((read, at) => {
      const seen = reads.findIndex((other) => other.meter === read.meter) < at;
      if (!seen) checks.push(followCheck(channel, read, reads, before));
    });
    if (reads.length > 0) checks.push(...missingMeters(channel, reads, before));
  }
  return checks;
}

/** One meter's check, by its first read: the first joint of its reads that does not meet, else the last. */
function followCheck(
  channel: (typeof CHANNELS)[number],
  first: RegisterRead,
  reads: RegisterRead[],
  before: RegisterRead[],
): Check {
  const { meter } = first;
  const about = `${channel}:${meter}`;
  const title = `Register reads follow on, ${CHANNEL_WORDS[channel].toLowerCase()}`;
  const last = ofMeter(before, meter).at(-1);
  if (last === undefined) {
    const gone = metersOf(before).some((other) => !readToTheEnd(reads, other));
    if (gone) return exchangeCheck(about, title, first, reads, before);
    if (before.length > 0) {
      return nothingToCompare('registersFollow', about, 'kWh', {
        title,
        stated: first.previous,
        cause: `Meter ${meter} is new beside ${metersOf(before).join(' and ')}; its reads begin here.`,
      });
    }
    return nothingToCompare('registersFollow', about, 'kWh', {
      title,
      stated: first.previous,
      cause: 'No earlier read of this meter is on record.',
    });
  }
  const follows = (read: RegisterRead, prior: RegisterRead): Check => {
    const sides = { stated: read.previous, found: prior.current, tolerance: '0', unit: 'kWh' as const };
    return compareDecimals('registersFollow', about, title, sides, () => ({
      cause: `Meter ${meter} was read ${prior.current} on ${sayDate(prior.to)}; this statement starts from ${read.previous}.`,
      advice: 'Ask the utility which read is right. The kWh between the two are billed twice or not at all.',
    }));
  };
  // Segments of one meter inside one statement must meet as well.
  let prior = first;
  let check = follows(first, last);
  for (const read of ofMeter(reads, meter).slice(1)) {
    if (check.verdict === 'differs') return check;
    check = follows(read, prior);
    prior = read;
  }
  return check;
}

/** Meters of the statement before that this one does not read, where no new meter took their place. */
function missingMeters(channel: (typeof CHANNELS)[number], reads: RegisterRead[], before: RegisterRead[]): Check[] {
  const known = metersOf(before);
  if (metersOf(reads).some((meter) => !known.includes(meter))) return [];
  const missing = known.filter((meter) => readToTheEnd(before, meter) && ofMeter(reads, meter).length === 0);
  return missing.map((meter) =>
    nothingToCompare('registersFollow', `${channel}:${meter}`, 'kWh', {
      title: `Register reads follow on, ${CHANNEL_WORDS[channel].toLowerCase()}`,
      cause: `Meter ${meter} was read on the last statement and is not on this one.`,
      advice: 'If it was taken out, nothing is to do. If not, its kWh are missing here: add its read.',
    }),
  );
}

function metersOf(reads: readonly RegisterRead[]): string[] {
  return [...new Set(reads.map((read) => read.meter))];
}

/** Whether a meter is read to the last day that any of these reads has. */
function readToTheEnd(reads: readonly RegisterRead[], meter: string): boolean {
  const end = reads
    .map((read) => read.to)
    .sort()
    .at(-1);
  return reads.some((read) => read.meter === meter && read.to === end);
}

function exchangeCheck(
  about: string,
  title: string,
  first: RegisterRead,
  reads: RegisterRead[],
  before: RegisterRead[],
): Check {
  const removed = [...before, ...reads].filter((read) => read.meter !== first.meter && read.to <= first.from).at(-1);
  const sides = { stated: first.from, found: removed?.to ?? 'no final read', difference: null, unit: 'date' as const };
  const check = compareText('registersFollow', about, `${title}, new meter`, sides, () => ({
    cause: removed
      ? `The old meter was last read on ${sayDate(removed.to)}; the new meter ${first.meter} begins on ${sayDate(first.from)}.`
      : `Meter ${first.meter} is new and the old meter has no final read.`,
    advice: 'Ask the utility for the final read of the old meter and the first read of the new one.',
  }));
  return check.verdict === 'agrees'
    ? { ...check, cause: `Meter ${first.meter} was put in on ${sayDate(first.from)}.` }
    : check;
}

/** Actual reads agree; an estimated one is nothing to compare until the next actual read settles both cycles (net-metering.md §4). */
export function readTypeCheck(context: CheckContext): Check {
  const title = 'Read type';
  const { paper, papers, runs } = context;
  // A channel that closes on an estimate is in a run, whose last read may be this one.
  const joined = CHANNELS.map((channel) => runs.get(runKey(paper.index, channel))).filter((run) => run !== undefined);
  const estimated = joined.filter((run) => closesEstimated(paper.reads, run.channel) === true);
  if (paper.reads.length === 0) {
    return nothingToCompare('readType', '', 'text', {
      title,
      cause: 'The statement’s meter reads are not entered.',
      advice: 'Add them to check that the kWh follow from the meter.',
    });
  }
  if (estimated.length === 0) {
    const sides = { stated: 'actual', found: 'actual', difference: null, unit: 'text' as const };
    return compareText('readType', '', title, sides, () => ({ cause: null, advice: null }));
  }
  const names = estimated.map((run) => run.channel).join(' and ');
  if (estimated.some((run) => run.pending)) {
    return nothingToCompare('readType', '', 'text', {
      title,
      stated: 'estimated',
      cause: `The ${names} read is an estimate. The next actual read settles this cycle and the one after it; until then it is provisional.`,
      advice: 'Read the meter yourself today and keep a photo of it.',
    });
  }
  // Papers are in order of date.
  let settledOn = paper.to;
  for (const { index, to } of papers) if (estimated.some((run) => run.cycles.includes(index))) settledOn = to;
  return nothingToCompare('readType', '', 'text', {
    title,
    stated: 'estimated',
    cause: `The ${names} read is an estimate, made up for by the actual read of ${sayDay(settledOn)}.`,
  });
}

/** Whether an estimated read of the cycle still awaits the actual one after it. */
export function isProvisional({ paper, runs }: Pick<CheckContext, 'paper' | 'runs'>): boolean {
  return CHANNELS.some((channel) => runs.get(runKey(paper.index, channel))?.pending === true);
}

/** One meter's reads; mostly the channel has no other meter. */
function ofMeter(reads: RegisterRead[], meter: string): RegisterRead[] {
  return reads.every((read) => read.meter === meter) ? reads : reads.filter((read) => read.meter === meter);
}

function readsOf(statement: Statement | null, channel: RegisterRead['channel']): RegisterRead[] {
  return statement?.reads.filter((read) => read.channel === channel) ?? [];
}

function byDate(reads: RegisterRead[]): RegisterRead[] {
  if (reads.length < 2) return reads;
  return [...reads].sort((a, b) => a.from.localeCompare(b.from));
}
