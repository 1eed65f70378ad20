import { sayCount, sayDay, sayKwh } from '../ledger/say.ts';
import { isComplete } from '../metering/cycle-energy.ts';
import { estimateOf, expectedWh } from '../metering/expected-production.ts';
import { addDays, type Day } from '../units/day.ts';
import { kwhText, sumWh, type Wh, wh } from '../units/energy.ts';
import { Exact } from '../units/rate.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { compareWh, type Difference, nothingToCompare } from './make-check.ts';

/** Weather moves a month's production by up to a quarter either way (common practice, no source). */
const SHARE = '0.25';
/** A dark month's few kWh move by a larger share of themselves, but not of an average month's (common practice, no source). */
const SHARE_OF_AVERAGE = '0.15';
const DAYS_PER_YEAR = 365;
/** A day below a twentieth of the cycle's middle day stood still or was not recorded (common practice, no source). */
const STILL_PARTS = 20;
const NAMED_DAYS = 5;

/**
 * Production against the installer's estimate for the same days, aged since switch-on. It agrees within 25 % either way, or within 15 % of what an average month's
 * days make where that is more: a fixed share alone would call every dark December a fault.
 */
export function productionExpectedCheck(context: CheckContext): Check {
  const title = 'Production against the estimate for these days';
  const { paper, metered, facts } = context;
  const missing = (cause: string, advice: string, stated: string | null = null) =>
    nothingToCompare('productionExpected', '', 'kWh', { title, stated, cause, advice });
  const { production } = metered.energy;
  if (!isComplete(production)) {
    return missing(
      'The production of this cycle is not completely known.',
      'Add the production meter’s reads or upload a production file for the whole cycle.',
    );
  }
  const estimate = estimateOf(facts.house, facts.assumptions.degradation);
  if (estimate === null) {
    return missing(
      'There is no estimate by month of what the roof should make.',
      'Enter the twelve months of the installer’s proposal in set-up.',
      kwhText(production.wh),
    );
  }
  const found = expectedWh(estimate, paper.from, paper.to);
  const average = new Exact(sumWh(estimate.monthlyWh)).times(paper.days).div(DAYS_PER_YEAR);
  const tolerance = Exact.max(new Exact(found).times(SHARE), average.times(SHARE_OF_AVERAGE));
  const sides = { stated: production.wh, found, tolerance: wh(tolerance.floor().toNumber()) };
  return compareWh('productionExpected', '', title, sides, () => expectedTexts(context, sides.stated, found));
}

function expectedTexts(context: CheckContext, made: Wh, expected: Wh): Difference {
  const percent = expected === 0 ? null : new Exact(made - expected).abs().times(100).div(expected).toDecimalPlaces(0);
  const apart = `${percent === null ? '' : `${percent.toString()} % `}${made < expected ? 'below' : 'above'} the estimate of ${sayKwh(expected)} kWh.`;
  if (made > expected) {
    return {
      cause: `Made ${apart} A production meter’s multiplier or an estimate that was too low would look like this.`,
      advice: 'Compare the multiplier on the meter with the one in set-up, and the estimate with the proposal.',
    };
  }
  const still = stillDays(context);
  const days =
    still.length === 0
      ? 'No day of the file stands out, so it is every day a little: snow, shade, dirt, or one string or inverter less.'
      : `Next to nothing on ${sayCount(still.length, 'day', 'days')}: ${still.slice(0, NAMED_DAYS).map(sayDay).join(', ')}${still.length > NAMED_DAYS ? ' and more' : ''}.`;
  const { monitor } = context.metered;
  const seen = monitor?.complete ? ` The monitoring counts ${sayKwh(monitor.figure.wh)} kWh.` : '';
  return {
    cause:
      `Made ${apart} ${context.metered.witnesses.production.intervals === null && monitor === null ? '' : days}${seen}`.trim(),
    advice:
      'Look at the inverter’s display and its faults on those days, then for snow and new shade. Opening anything is for a licensed electrician.',
  };
}

/** Days of the cycle's own file (failing that, of the monitoring) with next to nothing beside days that made something. */
function stillDays({ paper, metered, index }: CheckContext): Day[] {
  const channel = metered.witnesses.production.intervals === null ? 'monitor' : 'production';
  const days: { date: Day; wh: number }[] = [];
  for (let at = 0; at < paper.days; at += 1) {
    const date = addDays(paper.from, at);
    const held = index.byChannel.get(channel)?.get(date);
    if (held !== undefined && held.missing < held.steps) days.push({ date, wh: held.wh });
  }
  const sizes = days.map((one) => one.wh).sort((a, b) => a - b);
  const middle = sizes[Math.floor(sizes.length / 2)] ?? 0;
  return days.filter((one) => one.wh * STILL_PARTS < middle).map((one) => one.date);
}
