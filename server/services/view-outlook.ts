import type { OutlookView } from '#shared/api/outlook.ts';
import type { ProjectionBasis } from '#shared/position/basis.ts';
import { carbonOf } from '#shared/position/carbon.ts';
import { handbookOf } from '#shared/position/handbook.ts';
import { rangeOf } from '#shared/position/range.ts';
import type { Deps } from '../deps.ts';
import { ledgerOf } from './ledger-of.ts';

/** Worked out once per basis: the ledger, and with it its basis, is remembered until the household changes. */
const made = new WeakMap<ProjectionBasis, Omit<OutlookView, 'assumptions'>>();

/** The range, the handbook figures and the carbon of a household's projection, and its assumptions. */
export function viewOutlook(deps: Pick<Deps, 'db' | 'clock'>, householdId: string): OutlookView {
  const { facts, ledger } = ledgerOf(deps, householdId);
  const { assumptions } = facts;
  const { basis, position, entries } = ledger;
  if (basis === null) {
    return { range: null, whyNoRange: position.whyNoProjection, handbook: null, carbon: null, assumptions };
  }
  let known = made.get(basis);
  if (!known) {
    const range = rangeOf(basis);
    known = {
      range: range.ok ? range.range : null,
      whyNoRange: range.ok ? null : range.why,
      handbook: handbookOf({ basis, points: position.points, entries }),
      carbon: carbonOf(basis),
    };
    made.set(basis, known);
  }
  return { ...known, assumptions };
}
