import type { PaperSource, ReadChannel, RegisterRead } from '../facts/papers.ts';
import type { EnergyFigure } from '../ledger/cycle.ts';
import { Exact, exact, roundToWh } from '../units/rate.ts';
import type { WorkingInput } from '../working.ts';
import { input, paperSourceOf } from './source.ts';

const NONE = new Exact(0);

/** What a dial adds when it passes all nines: 10^dials where the current read is below the previous, else 0. */
export function rollOver(read: RegisterRead): Exact {
  return exact(read.current).lt(exact(read.previous)) ? new Exact(10).pow(read.dials) : NONE;
}

/**
 * kWh of one register read: ((current − previous) mod 10^dials) × multiplier
 * (net-metering.md §4 "dial rollover", "multiplier").
 */
export function registerKwh(read: RegisterRead): Exact {
  return exact(read.current).minus(exact(read.previous)).plus(rollOver(read)).times(exact(read.multiplier));
}

/**
 * Energy of a channel from its register reads, summed over meters and over the segments of a meter exchange; null when the statement holds
 * no read of the channel. The working evaluates to the figure in kWh.
 */
export function registerEnergy(
  reads: readonly RegisterRead[],
  channel: ReadChannel,
  paper: PaperSource,
): EnergyFigure | null {
  const own = reads.filter((read) => read.channel === channel);
  if (own.length === 0) return null;
  let kwh = new Exact(0);
  const inputs: WorkingInput[] = [];
  const terms: string[] = [];
  const words: string[] = [];
  own.forEach((read, at) => {
    const n = at + 1;
    const source = paperSourceOf(paper, read.row);
    const over = rollOver(read);
    kwh = kwh.plus(registerKwh(read));
    inputs.push(
      input(`current${n}`, `Meter ${read.meter}, read of ${read.to}`, read.current, 'kWh', source),
      input(`previous${n}`, `Meter ${read.meter}, read of ${read.from}`, read.previous, 'kWh', source),
    );
    let term = `current${n} - previous${n}`;
    let said = `${read.current} − ${read.previous}`;
    if (!over.isZero()) {
      inputs.push(input(`over${n}`, `Dial roll-over, ${read.dials} dials`, over, 'kWh', source));
      term += ` + over${n}`;
      said += ` + ${over.toString()} (the dials passed all nines)`;
    }
    if (read.multiplier !== '1') {
      inputs.push(input(`multiplier${n}`, `Multiplier of meter ${read.meter}`, read.multiplier, 'factor', source));
      term = `(${term}) * multiplier${n}`;
      said = `(${said}) × ${read.multiplier}`;
    }
    terms.push(own.length > 1 ? `(${term})` : term);
    words.push(own.length > 1 ? `(${said})` : said);
  });
  const wh = roundToWh(kwh);
  const whole = kwh.times(1000).isInteger();
  const formula = terms.join(' + ');
  return {
    wh,
    from: 'register',
    coverage: 1,
    working: {
      words: words.join(' + '),
      formula: whole ? formula : `roundWhole((${formula}) * 1000) / 1000`,
      inputs,
      unit: 'kWh',
      basis: own.some((read) => read.type === 'estimated') ? 'estimated' : 'metered',
    },
  };
}
