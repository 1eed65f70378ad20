import type { HandbookColumn, PlainFigure } from '#shared/position/outlook.ts';
import { decimal, money } from '#src/lib/format.ts';
import { percentWords } from '#src/lib/typed-values.ts';

/** A handbook figure as it is shown. */
export function plainWords(figure: PlainFigure): string {
  switch (figure.working.unit) {
    case 'years':
      return `${decimal(figure.value)} years`;
    case 'fraction':
      return percentWords(figure.value);
    case 'USD/kWh':
      return `$${fourDecimals(figure.value)}`;
    default:
      return `${decimal(figure.value)} ${figure.working.unit}`;
  }
}

/** A price to a hundredth of a cent, its zeros kept so that a column lines up. */
function fourDecimals(text: string): string {
  const [whole = '0', rest = ''] = text.split('.');
  return `${whole}.${rest.padEnd(4, '0')}`;
}

export type HandbookRow = {
  key: keyof HandbookColumn;
  label: string;
  meaning: string;
  /** What stands where the flows give no figure. */
  none: string;
};

/** The five figures in their order, each with one line of what it means. */
export function handbookRows(discountRate: string): HandbookRow[] {
  const rate = percentWords(discountRate);
  return [
    {
      key: 'simplePayback',
      label: 'Simple payback',
      meaning: 'Years until what came in has made good what went out, and keeps doing so.',
      none: 'not within the horizon',
    },
    {
      key: 'discountedPayback',
      label: 'Discounted payback',
      meaning: `The same, with a sum a year away worth ${rate} less.`,
      none: 'not within the horizon',
    },
    {
      key: 'rateOfReturn',
      label: 'Rate of return',
      meaning: 'The yearly interest that would have done as well.',
      none: 'no single rate fits',
    },
    {
      key: 'netPresentValue',
      label: 'Net present value',
      meaning: `All sums to the horizon at their worth on the first day, at ${rate} a year.`,
      none: '',
    },
    {
      key: 'costPerKwh',
      label: 'Cost per kWh made',
      meaning:
        'What the roof costs less tax credit and other income, over all it makes, both at their worth on the first day.',
      none: 'no production',
    },
  ];
}

/** The text of a figure of a column; null where there is none. */
export function figureWords(column: HandbookColumn, key: keyof HandbookColumn): string | null {
  if (key === 'netPresentValue') return money(column.netPresentValue.amountCents);
  const figure = column[key];
  return figure && plainWords(figure);
}
