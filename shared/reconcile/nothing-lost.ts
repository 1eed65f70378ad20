import type { ReadChannel, RegisterRead } from '../facts/papers.ts';
import { sayDate } from '../ledger/say.ts';
import { daysBetween, earliestDay, latestDay } from '../units/day.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareText } from './make-check.ts';
import { planChangeChecks } from './plan-change.ts';
import { trueUpChecks } from './true-up-event.ts';

const CHANNELS: readonly ReadChannel[] = ['import', 'export', 'production'];

/**
 * Nothing is lost at a meter exchange, a change of plan or a true-up (net-metering.md §4 "meter exchange", "lost at rate or supplier change", "true-up"). A balance that both
 * plans know is followed by the bank's own check, and reads that should meet by the registers'; here is what those cannot see, and no error twice.
 * `others`: the checks made before.
 */
export function nothingLostChecks(context: CheckContext, others: readonly Check[]): Check[] {
  return [...exchangeChecks(context, others), ...planChangeChecks(context), ...trueUpChecks(context, others)];
}

/** Where a new meter takes over a channel, old and new together cover the whole statement; whether they meet is the registers' own check. */
function exchangeChecks({ paper: { statement, previous } }: CheckContext, others: readonly Check[]): Check[] {
  return CHANNELS.flatMap((channel) => {
    const reads = ofChannel(statement.reads, channel);
    const before = ofChannel(previous?.reads ?? [], channel);
    if (!isExchange(reads, before) || joinsDiffer(others, channel)) return [];
    const from = earliestDay(statement.to, ...reads.map((read) => read.from));
    const to = latestDay(statement.from, ...reads.map((read) => read.to));
    const covered = daysBetween(from, to);
    const days = daysBetween(statement.from, statement.to);
    const sides = {
      stated: String(covered),
      found: String(days),
      difference: String(covered - days),
      unit: 'days' as const,
    };
    const title = `Meter exchange: the ${channel} reads cover the whole cycle`;
    return [
      compareText('nothingLost', `exchange.${channel}`, title, sides, () => ({
        cause: `Old and new meter together are read from ${sayDate(from)} to ${sayDate(to)}; the statement runs from ${sayDate(statement.from)} to ${sayDate(statement.to)}.`,
        advice: 'Ask the utility for the read that is missing: the last of the old meter or the first of the new one.',
      })),
    ];
  });
}

/** A meter that was not there begins when one that was there ends, within the statement or at its start. */
function isExchange(reads: readonly RegisterRead[], before: readonly RegisterRead[]): boolean {
  return reads.some(
    (read) =>
      before.length > 0 &&
      before.every((old) => old.meter !== read.meter) &&
      before.some((old) => reads.every((other) => other.meter !== old.meter || other.to <= read.from)),
  );
}

function joinsDiffer(others: readonly Check[], channel: ReadChannel): boolean {
  return others.some(
    ({ check, about, verdict }) =>
      check === 'registersFollow' && about.startsWith(`${channel}:`) && verdict === 'differs',
  );
}

function ofChannel(reads: readonly RegisterRead[], channel: ReadChannel): RegisterRead[] {
  return reads.filter((read) => read.channel === channel);
}
