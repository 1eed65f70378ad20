import type { Cents } from '../units/cents.ts';
import { dollarsText, subtractCents } from '../units/cents.ts';
import { kwhText, type Wh, wh } from '../units/energy.ts';
import type { Check, CheckId } from './check.ts';

type Texts = { title: string; cause?: string | null; advice?: string | null };

/** A check that has nothing to compare: `cause` says what is missing and what would settle it. */
export function nothingToCompare(
  check: CheckId,
  about: string,
  unit: Check['unit'],
  texts: Texts & { stated?: string | null; found?: string | null },
): Check {
  return {
    ...keyed(check, about),
    title: texts.title,
    verdict: 'nothing-to-compare',
    stated: texts.stated ?? null,
    found: texts.found ?? null,
    difference: null,
    tolerance: null,
    unit,
    cause: texts.cause ?? null,
    advice: texts.advice ?? null,
    accepted: null,
  };
}

/** Compares energies in kWh; agrees while they lie within the tolerance. Cause and advice are for a difference and left out where there is none. */
export function compareWh(check: CheckId, about: string, stated: Wh, found: Wh, tolerance: Wh, texts: Texts): Check {
  const difference = wh(stated - found);
  const agrees = Math.abs(difference) <= tolerance;
  return {
    ...keyed(check, about),
    title: texts.title,
    verdict: agrees ? 'agrees' : 'differs',
    stated: kwhText(stated),
    found: kwhText(found),
    difference: kwhText(difference),
    tolerance: kwhText(tolerance),
    unit: 'kWh',
    cause: agrees ? null : (texts.cause ?? null),
    advice: agrees ? null : (texts.advice ?? null),
    accepted: null,
  };
}

/** Compares sums of money. */
export function compareCents(
  check: CheckId,
  about: string,
  stated: Cents,
  found: Cents,
  toleranceCents: Cents,
  texts: Texts,
): Check {
  const difference = subtractCents(stated, found);
  const agrees = Math.abs(difference) <= toleranceCents;
  return {
    ...keyed(check, about),
    title: texts.title,
    verdict: agrees ? 'agrees' : 'differs',
    stated: dollarsText(stated),
    found: dollarsText(found),
    difference: dollarsText(difference),
    tolerance: dollarsText(toleranceCents),
    unit: 'USD',
    cause: agrees ? null : (texts.cause ?? null),
    advice: agrees ? null : (texts.advice ?? null),
    accepted: null,
  };
}

/** Compares two texts or dates. */
export function compareText(
  check: CheckId,
  about: string,
  unit: 'date' | 'text' | 'days',
  stated: string,
  found: string,
  texts: Texts & { difference?: string | null },
): Check {
  const agrees = stated === found;
  return {
    ...keyed(check, about),
    title: texts.title,
    verdict: agrees ? 'agrees' : 'differs',
    stated,
    found,
    difference: texts.difference ?? null,
    tolerance: null,
    unit,
    cause: agrees ? null : (texts.cause ?? null),
    advice: agrees ? null : (texts.advice ?? null),
    accepted: null,
  };
}

function keyed(check: CheckId, about: string): Pick<Check, 'check' | 'about' | 'key'> {
  return { check, about, key: `${check}:${about}` };
}
