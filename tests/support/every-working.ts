import type { Cents } from '#shared/units/cents.ts';
import type { Wh } from '#shared/units/energy.ts';
import { type Exact, exact, kwhOf, usdOf } from '#shared/units/rate.ts';
import { type Working, workingSchema } from '#shared/working.ts';
import { evaluateWorking } from '#shared/working-formula.ts';

/** A figure whose working was found beside it, and whether evaluating the one gives the other. */
export type WorkedFigure = { path: string; figure: string; evaluated: string; agrees: boolean; words: string };

/**
 * Walks any value and re-evaluates every working that stands beside a figure (`amountCents` in USD, `wh` in kWh, `value` as decimal text). Returns all of them, so that a test can
 * show that it looked at some. A working beside neither is returned as not agreeing: nothing says what it works out.
 */
export function everyWorking(root: unknown): WorkedFigure[] {
  const found: WorkedFigure[] = [];
  const seen = new Set<object>();
  const visit = (value: unknown, path: string): void => {
    if (typeof value !== 'object' || value === null || seen.has(value)) return;
    seen.add(value);
    if (Array.isArray(value)) {
      value.forEach((item, at) => {
        visit(item, `${path}[${at}]`);
      });
      return;
    }
    const record = value as Record<string, unknown>;
    const working = workingSchema.safeParse(record.working);
    if (working.success) found.push(check(record, working.data, path));
    for (const [key, inner] of Object.entries(record))
      if (key !== 'working') visit(inner, path === '' ? key : `${path}.${key}`);
  };
  visit(root, '');
  return found;
}

/** The figure a working stands beside: money, energy, or decimal text in the working's own unit. */
function figureOf({ amountCents, wh, value }: Record<string, unknown>): Exact | null {
  if (typeof amountCents === 'number') return usdOf(amountCents as Cents);
  if (typeof wh === 'number') return kwhOf(wh as Wh);
  return typeof value === 'string' ? exact(value) : null;
}

function check(record: Record<string, unknown>, working: Working, path: string): WorkedFigure {
  const figure = figureOf(record);
  let evaluated = '';
  let agrees = false;
  try {
    const value = evaluateWorking(working);
    evaluated = value.toString();
    agrees = figure?.eq(value) ?? false;
  } catch (error) {
    evaluated = error instanceof Error ? error.message : String(error);
  }
  return {
    path,
    figure: figure?.toString() ?? 'none',
    evaluated,
    agrees,
    words: `${working.words} [${working.formula}]`,
  };
}
