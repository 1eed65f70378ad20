import { cents, dollarsText, parseDollars } from '#shared/units/cents.ts';
import { plainDecimal } from '#src/lib/typed-values.ts';
import type { Scale } from './slider-field.tsx';

/** Dollars up to an amount in cents, in steps of whole dollars; the last step is the amount itself, to the cent. */
export function dollarScale(mostCents: number, stepDollars: number): Scale {
  const step = stepDollars * 100;
  return {
    least: 0,
    most: Math.max(step, Math.ceil(mostCents / step) * step),
    step,
    at: parseDollars,
    text: (at) => dollarsText(cents(at >= mostCents && mostCents > 0 ? mostCents : at)),
  };
}

/** Percents in tenths. */
export function percentScale(least: number, most: number, tenths = 1): Scale {
  return { least: least * 10, most: most * 10, step: tenths, at: tenthsOf, text: (at) => String(at / 10) };
}

export function wholeScale(least: number, most: number, step: number): Scale {
  return {
    least,
    most,
    step,
    at: (text) => (/^\d{1,6}$/.test(text.trim()) ? Number(text) : null),
    text: String,
  };
}

function tenthsOf(text: string): number | null {
  const plain = plainDecimal(text.replace('%', ''));
  return plain === null ? null : Math.round(Number(plain) * 10);
}

/** Kilowatt-hours in tenths. */
export function kwhScale(most: number): Scale {
  return percentScale(0, most, 5);
}
