import { compare, exactText, minus, qtyOfText, sizeOf } from '../settlement/quantity.ts';
import type { Cents } from '../units/cents.ts';
import { dollarsText, subtractCents } from '../units/cents.ts';
import { kwhText, type Wh, wh } from '../units/energy.ts';
import type { Check, CheckId } from './check.ts';

/** What to say of a difference: its likely cause and what to do. Asked for only where there is one. */
export type Difference = { cause: string | null; advice: string | null };

const NO_DIFFERENCE: Difference = { cause: null, advice: null };

/** A check that has nothing to compare: `cause` says what is missing, `advice` what would settle it. */
export function nothingToCompare(
  check: CheckId,
  about: string,
  unit: Check['unit'],
  texts: {
    title: string;
    cause: string | null;
    advice?: string | null;
    stated?: string | null;
    found?: string | null;
  },
): Check {
  return {
    check,
    about,
    key: `${check}:${about}`,
    title: texts.title,
    verdict: 'nothing-to-compare',
    stated: texts.stated ?? null,
    found: texts.found ?? null,
    difference: null,
    tolerance: null,
    unit,
    cause: texts.cause,
    advice: texts.advice ?? null,
    accepted: null,
  };
}

/** Compares energies in kWh; agrees while they lie within the tolerance. */
export function compareWh(
  check: CheckId,
  about: string,
  title: string,
  sides: { stated: Wh; found: Wh; tolerance: Wh },
  differs: () => Difference,
): Check {
  const { stated, found, tolerance } = sides;
  const difference = wh(stated - found);
  const agrees = Math.abs(difference) <= tolerance;
  return made(check, about, title, 'kWh', agrees, differs, {
    stated: kwhText(stated),
    found: kwhText(found),
    difference: kwhText(difference),
    tolerance: kwhText(tolerance),
  });
}

/** Compares sums of money. */
export function compareCents(
  check: CheckId,
  about: string,
  title: string,
  sides: { stated: Cents; found: Cents; tolerance: Cents },
  differs: () => Difference,
): Check {
  const { stated, found, tolerance } = sides;
  const difference = subtractCents(stated, found);
  const agrees = Math.abs(difference) <= tolerance;
  return made(check, about, title, 'USD', agrees, differs, {
    stated: dollarsText(stated),
    found: dollarsText(found),
    difference: dollarsText(difference),
    tolerance: dollarsText(tolerance),
  });
}

/** Compares decimal figures as they are printed: register reads, a bank's balances. */
export function compareDecimals(
  check: CheckId,
  about: string,
  title: string,
  sides: { stated: string; found: string; tolerance: string; unit: 'kWh' | 'USD' },
  differs: () => Difference,
): Check {
  const { stated, found, tolerance, unit } = sides;
  const difference = minus(qtyOfText(stated), qtyOfText(found));
  const agrees = compare(sizeOf(difference), qtyOfText(tolerance)) <= 0;
  return made(check, about, title, unit, agrees, differs, {
    stated,
    found,
    difference: exactText(difference),
    tolerance,
  });
}

/** Compares two texts or dates, or counts of days; `difference` is what to show between them. */
export function compareText(
  check: CheckId,
  about: string,
  title: string,
  sides: { stated: string; found: string; difference: string | null; unit: 'date' | 'text' | 'days' },
  differs: () => Difference,
): Check {
  const { stated, found, difference, unit } = sides;
  const tolerance = unit === 'days' ? '0' : null;
  return made(check, about, title, unit, stated === found, differs, { stated, found, difference, tolerance });
}

function made(
  check: CheckId,
  about: string,
  title: string,
  unit: Check['unit'],
  agrees: boolean,
  differs: () => Difference,
  values: Pick<Check, 'stated' | 'found' | 'difference' | 'tolerance'>,
): Check {
  const said = agrees ? NO_DIFFERENCE : differs();
  return {
    check,
    about,
    key: `${check}:${about}`,
    title,
    verdict: agrees ? 'agrees' : 'differs',
    stated: values.stated,
    found: values.found,
    difference: values.difference,
    tolerance: values.tolerance,
    unit,
    cause: said.cause,
    advice: said.advice,
    accepted: null,
  };
}
