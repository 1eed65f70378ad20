import type { Levers } from '../facts/scenario.ts';
import type { ProjectionBasis } from '../position/basis.ts';
import { projectFrom } from '../position/project.ts';
import { keepOfExport } from './export-cut.ts';
import type { HourlyExport } from './hourly-export.ts';
import { leverChanges } from './lever-changes.ts';
import { type LeverFault, leverFaults } from './lever-faults.ts';
import { type Outcome, outcomeOf } from './outcome.ts';

/** What a try starts from: the projection's basis, and when in the day the house sends out. */
export type TryBasis = { basis: ProjectionBasis; hourly: HourlyExport };

export type Tried =
  | { ok: true; outcome: Outcome /** What had to be assumed, in sentences. */; assumed: string[] }
  | { ok: false; why: string; faults: readonly LeverFault[] };

/**
 * The projection with levers pulled. Levers left alone give the base projection, month for month. Pure; the record, and every point of it, stays as it is.
 * Refused with `faults` where a lever cannot be pulled so (a day in the past, a loan that is not there), and with `why` where nothing can be projected.
 */
export function tryLevers({ basis, hourly }: TryBasis, levers: Levers): Tried {
  const faults = leverFaults(basis, levers);
  const [fault] = faults;
  if (fault !== undefined) return { ok: false, why: fault.message, faults };
  const pulled = leverChanges(basis, hourly, levers);
  const projected =
    levers.exportCut === null
      ? projectFrom(pulled.basis, pulled.changes)
      : keepOfExport(pulled.basis, pulled.changes, levers.exportCut);
  if (!projected.ok) return { ok: false, why: projected.why, faults: [] };
  const facts = { ...pulled.basis.facts, ...pulled.changes.facts };
  return {
    ok: true,
    outcome: outcomeOf(facts, projected.projection, basis.close.on, pulled.changes.endsOn),
    assumed: pulled.assumed,
  };
}
