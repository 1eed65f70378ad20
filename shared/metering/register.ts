import type { PaperSource, ReadChannel, RegisterRead } from '../facts/papers.ts';
import type { EnergyFigure } from '../ledger/cycle.ts';
import {
  compare,
  exactText,
  minus,
  ONE_UNIT,
  plus,
  type Qty,
  qtyOfText,
  scaled,
  times,
  whOfQty,
} from '../settlement/quantity.ts';
import type { WorkingInput } from '../working.ts';
import { input, paperSourceOf } from './source.ts';

/** What a dial adds, in thousandths of a kWh, when it passes all nines: 10^dials where the current read is below the previous, else 0. */
export function rollOver(read: RegisterRead): Qty {
  const passed = compare(qtyOfText(read.current), qtyOfText(read.previous)) < 0;
  return passed ? times(10 ** read.dials, ONE_UNIT) : 0;
}

/**
 * One register read in thousandths of a kWh: ((current − previous) mod 10^dials) × multiplier
 * (net-metering.md §4 "dial rollover", "multiplier").
 */
export function registerKwh(read: RegisterRead): Qty {
  const turned = plus(minus(qtyOfText(read.current), qtyOfText(read.previous)), rollOver(read));
  return scaled(turned, qtyOfText(read.multiplier));
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
  let kwh: Qty = 0;
  const inputs: WorkingInput[] = [];
  const terms: string[] = [];
  const words: string[] = [];
  own.forEach((read, at) => {
    const n = at + 1;
    const source = paperSourceOf(paper, read.row);
    const over = rollOver(read);
    kwh = plus(kwh, registerKwh(read));
    inputs.push(
      input(`current${n}`, `Meter ${read.meter}, read of ${read.to}`, read.current, 'kWh', source),
      input(`previous${n}`, `Meter ${read.meter}, read of ${read.from}`, read.previous, 'kWh', source),
    );
    let term = `current${n} - previous${n}`;
    let said = `${read.current} − ${read.previous}`;
    if (over !== 0) {
      inputs.push(input(`over${n}`, `Dial roll-over, ${read.dials} dials`, exactText(over), 'kWh', source));
      term += ` + over${n}`;
      said += ` + ${exactText(over)} (the dials passed all nines)`;
    }
    if (read.multiplier !== '1') {
      inputs.push(input(`multiplier${n}`, `Multiplier of meter ${read.meter}`, read.multiplier, 'factor', source));
      term = `(${term}) * multiplier${n}`;
      said = `(${said}) × ${read.multiplier}`;
    }
    terms.push(own.length > 1 ? `(${term})` : term);
    words.push(own.length > 1 ? `(${said})` : said);
  });
  const whole = typeof kwh === 'number';
  const formula = terms.join(' + ');
  return {
    wh: whOfQty(kwh),
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
