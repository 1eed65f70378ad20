import { Exact } from '../units/rate.ts';

/**
 * Present value of sums a year apart, the first undiscounted: Σ flows[n] / (1 + rate)^n (single present value factors; NIST Handbook 135; the same as
 * numpy-financial's `npv`).
 */
export function presentValue(rate: Exact, flows: readonly Exact[]): Exact {
  const factor = new Exact(1).div(rate.plus(1));
  return flows.reduceRight((value, flow) => value.times(factor).plus(flow), new Exact(0));
}

/**
 * Years until the sums so far, discounted, have paid off what was spent and stay paid off; inside a year by its share. At a rate of zero the simple
 * payback. Null where they do not (ASTM E1121: when cumulative discounted net benefits just pay off the initial cost).
 */
export function paybackYears(rate: Exact, flows: readonly Exact[]): Exact | null {
  const growth = rate.plus(1);
  const zero = new Exact(0);
  let factor = new Exact(1);
  let sum = zero;
  let found: Exact | null = null;
  for (const [year, flow] of flows.entries()) {
    const before = sum;
    const part = flow.times(factor);
    sum = sum.plus(part);
    factor = factor.div(growth);
    if (sum.lt(0)) found = null;
    else if (found === null)
      found =
        year === 0
          ? zero
          : before
              .negated()
              .div(part)
              .plus(year - 1);
  }
  return found;
}

/** The first whole year at whose end they have, and stay so. */
export function paybackYear(rate: Exact, flows: readonly Exact[]): number | null {
  const years = paybackYears(rate, flows);
  return years === null ? null : years.ceil().toNumber();
}

const LOWEST = -0.98;
const HIGHEST = 3;
const STEP = 0.02;

/** Halvings of a step of 0.02: below 10^-15. */
const HALVINGS = 45;

/** Every yearly rate from −98 % to 300 % at which the sums are worth nothing today, in order. */
export function ratesOfReturn(flows: readonly Exact[]): Exact[] {
  const found: Exact[] = [];
  const steps = Math.round((HIGHEST - LOWEST) / STEP);
  let low = new Exact(LOWEST);
  let atLow = presentValue(low, flows);
  for (let step = 1; step <= steps; step += 1) {
    const high = new Exact(LOWEST).plus(new Exact(STEP).times(step));
    const atHigh = presentValue(high, flows);
    if (atHigh.isZero()) found.push(high);
    else if (!atLow.isZero() && atLow.isNegative() !== atHigh.isNegative()) found.push(between(low, high, flows));
    low = high;
    atLow = atHigh;
  }
  return found;
}

/**
 * The internal rate of return: the one yearly rate at which the sums are worth nothing today, to fifteen decimals. Null where there is none, or
 * several fit.
 */
export function rateOfReturn(flows: readonly Exact[]): Exact | null {
  const [rate, ...others] = flows.every((flow) => flow.isZero()) ? [] : ratesOfReturn(flows);
  return rate === undefined || others.length > 0 ? null : rate;
}

function between(from: Exact, to: Exact, flows: readonly Exact[]): Exact {
  let low = from;
  let high = to;
  const isNegative = presentValue(low, flows).isNegative();
  for (let step = 0; step < HALVINGS; step += 1) {
    const middle = low.plus(high).div(2);
    if (presentValue(middle, flows).isNegative() === isNegative) low = middle;
    else high = middle;
  }
  return low.plus(high).div(2).toDecimalPlaces(15);
}

/** Single present value factor (1 + d)^-n (NIST Handbook 135). */
export function singlePresentValue(rate: Exact, years: number): Exact {
  return rate.plus(1).pow(-years);
}

/** Uniform present value factor (1 − (1 + d)^-n) / d; n at a rate of zero (NIST Handbook 135). */
export function uniformPresentValue(rate: Exact, years: number): Exact {
  if (rate.isZero()) return new Exact(years);
  return new Exact(1).minus(singlePresentValue(rate, years)).div(rate);
}

/** Uniform capital recovery factor d(1 + d)^n / ((1 + d)^n − 1): the reciprocal of the uniform present value factor. */
export function capitalRecovery(rate: Exact, years: number): Exact {
  return new Exact(1).div(uniformPresentValue(rate, years));
}
