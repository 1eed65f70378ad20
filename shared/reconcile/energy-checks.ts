import { sayCount, sayGap, sayKwh } from '../ledger/say.ts';
import { runTotals } from '../metering/cycle-energy.ts';
import { runKey } from '../metering/estimated-reads.ts';
import type { IntervalReading } from '../metering/interval-index.ts';
import { kwhText, type Wh, wh } from '../units/energy.ts';
import { Exact } from '../units/rate.ts';
import { billedQuantity } from './billed-quantities.ts';
import type { Check } from './check.ts';
import type { CheckContext } from './check-context.ts';
import { exchangeGap } from './exchange-gap.ts';
import { compareWh, nothingToCompare } from './make-check.ts';

/** Meters in service within ±2 % each way, and a whole-kWh step at both ends (net-metering.md §5): "reject hard when E > P·1.04 + 2". */
const EXPORT_FACTOR = '1.04';
const EXPORT_STEP_WH = 2000;
/** Utility production meter against the inverter's own count (net-metering.md §5; from memory there, common practice). */
const MONITOR_SHARE = '0.05';

/**
 * Import or export as billed against the interval file; without a complete file, the billed kWh against the statement's own reads. Over cycles
 * joined by an estimated read the sums are compared, since each alone is right only by chance.
 */
export function channelCheck(context: CheckContext, channel: 'import' | 'export'): Check {
  const { paper, metered, settled } = context;
  const check = channel === 'import' ? 'importAgainstIntervals' : 'exportAgainstIntervals';
  const name = channel === 'import' ? 'Import' : 'Export';
  const title = `${name}, statement against interval file`;
  const seen = metered.witnesses[channel];
  const run = context.runs.get(runKey(paper.index, channel));
  if (paper.split !== null && !paper.readsFit) {
    return nothingToCompare(check, '', 'kWh', {
      title,
      found: seen.intervals?.complete ? kwhText(seen.intervals.figure.wh) : null,
      cause: 'The statement began before switch-on, and its kWh are shared by days.',
    });
  }
  if (run?.pending) {
    return nothingToCompare(check, '', 'kWh', {
      title,
      cause: `The ${channel} read is an estimate.`,
      advice: 'The next statement with an actual read settles it.',
    });
  }
  if (run) {
    const totals = runTotals(run, context.witnessed);
    if (totals !== null) {
      const sums = {
        stated: wh(totals.registerWh),
        found: wh(totals.intervalsWh),
        tolerance: wh(totals.toleranceWh),
      };
      const joined = `${title}, over ${run.cycles.length} cycles joined by an estimated read`;
      return compareWh(check, '', joined, sums, () => ({
        cause: `The estimate was not made up for: the reads give ${sayKwh(sums.stated)} kWh over these cycles, the interval file ${sayKwh(sums.found)}.`,
        advice: 'Ask the utility to read the meter again and correct both statements.',
      }));
    }
  }
  const billed = billedQuantity(paper, channel, settled.plan?.plan ?? null, settled.components);
  const stated = billed ?? seen.register?.wh ?? null;
  if (stated === null) {
    return nothingToCompare(check, '', 'kWh', {
      title,
      found: seen.intervals ? kwhText(seen.intervals.figure.wh) : null,
      cause: `The statement gives no ${channel} in kWh.`,
      advice: 'Add the meter reads or the kWh from the statement.',
    });
  }
  if (seen.intervals?.complete) {
    const sides = { stated, found: seen.intervals.figure.wh, tolerance: seen.toleranceWh };
    return compareWh(check, '', title, sides, () => {
      const texts = channelTexts(channel, wh(stated - sides.found), readsSay(seen.register?.wh ?? null, stated));
      const gap = stated < sides.found ? exchangeGap(context, channel) : null;
      return gap === null ? texts : { ...texts, cause: `${texts.cause} ${gap}` };
    });
  }
  if (billed !== null && seen.register !== null && paper.readsFit) {
    const sides = { stated: billed, found: seen.register.wh, tolerance: seen.toleranceWh };
    return compareWh(check, '', `${name}, billed against the meter reads`, sides, () =>
      channelTexts(channel, wh(billed - sides.found), null),
    );
  }
  return nothingToCompare(check, '', 'kWh', {
    title,
    stated: kwhText(stated),
    ...gapTexts(seen.intervals, `${channel} interval file`),
  });
}

function channelTexts(
  channel: 'import' | 'export',
  difference: Wh,
  reads: string | null,
): { cause: string; advice: string } {
  const size = `${sayGap(difference)} kWh`;
  const way = difference < 0 ? 'less' : 'more';
  const write = 'Write to the utility with both figures, or accept the difference with a note.';
  return {
    cause:
      channel === 'export'
        ? `It credits ${size} ${way} than your meter saw leave.`
        : `It charges ${size} ${way} than your meter saw come in.`,
    advice: reads === null ? write : `${reads} ${write}`,
  };
}

function readsSay(register: Wh | null, stated: Wh): string | null {
  if (register === null || Math.abs(register - stated) <= 1000) return null;
  return `The reads on the statement itself give ${sayKwh(register)} kWh.`;
}

function gapTexts(found: IntervalReading | null, file: string): { cause: string; advice: string } {
  if (found === null) {
    return { cause: `There is no ${file} for these days.`, advice: `Upload the ${file} to compare.` };
  }
  const gaps = [
    found.missingDays > 0 ? sayCount(found.missingDays, 'day', 'days') : null,
    found.missingSteps > 0 ? sayCount(found.missingSteps, 'reading', 'readings') : null,
  ].filter((gap) => gap !== null);
  return {
    cause: `The ${file} lacks ${gaps.join(' and ')} of this cycle’s ${found.days} days.`,
    advice: 'Upload a file that covers the whole cycle to compare.',
  };
}

/** What was sent out cannot be more than what was made: E ≤ P·1.04 + 2 kWh (net-metering.md §5). */
export function exportWithinProductionCheck({ metered }: CheckContext): Check {
  const title = 'Export within production';
  const { export: exporting, production } = metered.energy;
  if (exporting === null || production === null || metered.energy.selfUse === null) {
    return nothingToCompare('exportWithinProduction', '', 'kWh', {
      title,
      stated: exporting === null ? null : kwhText(exporting.wh),
      found: null,
      cause:
        production === null
          ? 'The production of this cycle is not known.'
          : 'Export or production is not complete for this cycle.',
      advice: 'Add the production meter’s reads or upload a production file for the whole cycle.',
    });
  }
  const most = wh(new Exact(production.wh).times(EXPORT_FACTOR).floor().toNumber() + EXPORT_STEP_WH);
  const sides = { stated: exporting.wh, found: production.wh, tolerance: wh(most - production.wh) };
  const made = compareWh('exportWithinProduction', '', title, sides, () => ({
    cause:
      'More left the house than the roof made. Import and export may be exchanged, or production is from other days.',
    advice: 'Look which register is which on the meter, and whether the production covers the same days.',
  }));
  // Only an export above production is wrong; below it, whatever the distance, the house used the rest.
  return exporting.wh <= most ? { ...made, verdict: 'agrees', cause: null, advice: null } : made;
}

/** The production meter against the inverter's monitoring, within 5 %, over equal windows only. */
export function productionAgainstMonitorCheck({ metered }: CheckContext): Check {
  const title = 'Production meter against monitoring file';
  const check = 'productionAgainstMonitor';
  const meter = metered.energy.production;
  const { monitor } = metered;
  if (meter === null || meter.from === 'monitor' || meter.working.basis === 'estimated') {
    return nothingToCompare(check, '', 'kWh', {
      title,
      found: monitor?.complete ? kwhText(monitor.figure.wh) : null,
      cause: 'There is no complete figure from the production meter for this cycle.',
      advice: 'Add the production meter’s reads to compare.',
    });
  }
  if (!monitor?.complete || meter.coverage < 1) {
    return nothingToCompare(check, '', 'kWh', {
      title,
      stated: kwhText(meter.wh),
      ...gapTexts(monitor, 'monitoring file'),
    });
  }
  const tolerance = wh(new Exact(meter.wh).abs().times(MONITOR_SHARE).floor().toNumber());
  const apart =
    meter.wh === 0 ? null : new Exact(meter.wh - monitor.figure.wh).abs().times(100).div(Math.abs(meter.wh));
  const said =
    apart === null
      ? 'They lie apart.'
      : `They lie ${apart.toDecimalPlaces(1).toString()} % apart; up to 5 % is ordinary.`;
  const sides = { stated: meter.wh, found: monitor.figure.wh, tolerance };
  const made = compareWh(check, '', title, sides, () => ({
    cause: said,
    advice:
      'Look for an inverter that stopped reporting, a missing day in the file, or a production meter that has to be tested.',
  }));
  return made.verdict === 'agrees' ? { ...made, cause: said } : made;
}
