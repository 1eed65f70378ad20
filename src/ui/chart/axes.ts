import type { ChartOptions } from 'chart.js';
import { type Day, dayFromNumber, dayNumber, yearOf } from '#shared/units/day.ts';
import { fullDate } from '#src/lib/format.ts';
import type { ChartTokens } from './tokens.ts';

/** Charts that stand one under the other give their amounts the same room at the left, so that a day stands at the same place in both. */
export const AXIS_WIDTH = 64;
export const RIGHT_EDGE = 14;

type LinearOptions = NonNullable<NonNullable<ChartOptions<'line'>['scales']>[string]>;

/** The days, with a year under the middle of each year. */
export function dayAxis(
  span: { first: Day; last: Day },
  tokens: ChartTokens,
  labels: 'years' | 'none',
  most: number,
): LinearOptions {
  const ticks = yearTicks(span.first, span.last, most, most < 10 ? 0.07 : 0.01);
  return {
    type: 'linear',
    min: dayNumber(span.first),
    max: dayNumber(span.last),
    display: labels === 'years',
    // A label at the edge may hang over it; it must not push the days out of line with the other chart.
    afterFit: (scale) => {
      scale.paddingLeft = 0;
      scale.paddingRight = 0;
    },
    border: { display: false },
    grid: { display: false },
    afterBuildTicks: (scale) => {
      scale.ticks = ticks.map((tick) => ({ value: tick.x }));
    },
    ticks: {
      autoSkip: false,
      maxRotation: 0,
      color: tokens.color('--color-soft'),
      font: { family: tokens.fontFamily, size: 14 },
      callback: (value) => dayFromNumber(Math.round(Number(value))).slice(0, 4),
    },
  };
}

/** Amounts in whole dollars, zero named `zero`. Values on the scale are dollars. */
export function moneyAxis(
  tokens: ChartTokens,
  given: { min: number; max: number; step: number; zero: string; width: number; grid: boolean },
): LinearOptions {
  const { min, max, step } = given;
  return {
    type: 'linear',
    min,
    max,
    border: { display: false },
    grid: {
      display: given.grid,
      drawTicks: false,
      color: (context) => (context.tick?.value === 0 ? 'transparent' : tokens.color('--color-rule')),
    },
    afterFit: (scale) => {
      scale.width = given.width;
    },
    afterBuildTicks: (scale) => {
      const values: { value: number }[] = [];
      for (let value = Math.ceil(min / step) * step; value <= max; value += step) values.push({ value });
      scale.ticks = values;
    },
    ticks: {
      autoSkip: false,
      padding: 10,
      color: (context) => tokens.color(context.tick?.value === 0 ? '--color-ink' : '--color-soft'),
      font: (context) => ({
        family: tokens.fontFamily,
        size: 14,
        weight: context.tick?.value === 0 ? 600 : 400,
      }),
      callback: (value) => axisDollars(Number(value), given.zero),
    },
  };
}

/** "−$12k", "$250"; zero by its name. */
export function axisDollars(value: number, zero: string): string {
  if (value === 0) return zero;
  const size = Math.abs(value);
  const text = size >= 1000 ? `${Number((size / 1000).toPrecision(3))}k` : String(size);
  return `${value < 0 ? '\u2212' : ''}$${text}`;
}

/** A step of 1, 2, 3, 5 or 10 times a power of ten that makes about `count` of them. */
export function niceStep(range: number, count: number): number {
  const rough = range / count;
  if (!(rough > 0)) return 1;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 3, 5, 10].find((factor) => factor * power >= rough) ?? 10;
  return step * power;
}

/** The tooltip in the page's own colours. */
export function tooltipLook(tokens: ChartTokens) {
  return {
    backgroundColor: tokens.color('--color-ink'),
    titleColor: tokens.color('--color-sheet'),
    bodyColor: tokens.color('--color-sheet'),
    footerColor: tokens.color('--color-sheet'),
    titleFont: { family: tokens.fontFamily, size: 14, weight: 600 as const },
    bodyFont: { family: tokens.fontFamily, size: 14 },
    footerFont: { family: tokens.fontFamily, size: 14, weight: 600 as const },
    padding: 10,
    cornerRadius: 4,
    displayColors: false,
  };
}

export function dateOfTick(value: number): string {
  return fullDate(dayFromNumber(Math.round(value)));
}

/** The years whose middle lies in the chart, thinned to at most `most`; none within `edge` (a share of the width) of the end. */
export function yearTicks(first: Day, last: Day, most: number, edge: number): { year: number; x: number }[] {
  const years: { year: number; x: number }[] = [];
  const end = dayNumber(last) - (dayNumber(last) - dayNumber(first)) * edge;
  for (let year = yearOf(first); year <= yearOf(last); year += 1) {
    const x = dayNumber(`${year}-07-01` as Day);
    if (x >= dayNumber(first) && x <= end) years.push({ year, x });
  }
  const step = Math.max(1, Math.ceil(years.length / most));
  return years.filter((_, index) => index % step === (step > 1 ? 1 : 0));
}
