import type { RatePlan } from '../../settlement/plan.ts';
import type { SettledAmounts } from '../../settlement/settle.ts';
import type { CycleUsage, Opening } from '../../settlement/settlement.ts';
import type { CauseCycle, CauseId } from './cause.ts';
import type { BilledSums } from './reproduces.ts';
import type { Scene } from './scene.ts';

/** One mistake made in one cycle: what it is settled with in place of the truth. */
export type Edit = {
  /** Edits of one key in several cycles are one mistake made in each of them. */
  key: string;
  plan: RatePlan | null;
  usage: CycleUsage | null;
  opening: ((opening: Opening) => Opening) | null;
  /** Changes the settled cycle where no plan can say the mistake; null when it cannot be made there. */
  after: ((settled: SettledAmounts) => SettledAmounts | null) | null;
  /** The sentence to the owner, from the cycle as it comes out under the mistake. */
  words: (settled: SettledAmounts) => string;
  found: Record<string, string>;
};

/** A mistake over the cycles: an edit for each cycle it is made in, in order. */
export type Attempt = readonly { place: Place; edit: Edit }[];

export type Hypothesis = {
  cause: CauseId;
  /** Parts of a statement that may be right although the bill was worked out with the mistake. */
  overlooks: { days: boolean; kWh: boolean };
  attempts: (scene: Scene) => Attempt[];
};

/** A cycle as a hypothesis sees it: its inputs, what it truly opens with and comes to, and what was billed otherwise. */
export type Place = {
  index: number;
  cycle: CauseCycle;
  opening: Opening;
  truth: SettledAmounts;
  sums: BilledSums;
  /** Components and banks surely billed otherwise; not told after the first cycle billed otherwise. */
  differs: ReadonlySet<string>;
  /**
   * Whether a component or bank may be what a mistake in this cycle touched: it is billed otherwise, or the bill does not speak of it. Always after the
   * first cycle billed otherwise, since what that left behind may hide a difference.
   */
  mayDiffer: (id: string) => boolean;
  /** The plan of the cycle before, where that is given. */
  planBefore: RatePlan | null;
};

const NOTHING = { plan: null, usage: null, opening: null, after: null };

/** An edit that changes only what is given. */
export function edit(
  key: string,
  changes: Partial<Pick<Edit, 'plan' | 'usage' | 'opening' | 'after'>>,
  words: Edit['words'] | string,
  found: Record<string, string> = {},
): Edit {
  return { ...NOTHING, ...changes, key, words: typeof words === 'string' ? () => words : words, found };
}

/** A mistake that can be made in any one cycle: tried in each alone, and in all in which it can be made. */
export function hypothesis(
  cause: CauseId,
  edits: (place: Place) => Edit[],
  overlooks: Partial<Hypothesis['overlooks']> = {},
): Hypothesis {
  return {
    cause,
    overlooks: { days: false, kWh: false, ...overlooks },
    attempts: (scene) => {
      const alone: Attempt[] = [];
      const together = new Map<string, { place: Place; edit: Edit }[]>();
      for (const place of scene.places) {
        for (const made of edits(place)) {
          alone.push([{ place, edit: made }]);
          together.set(made.key, [...(together.get(made.key) ?? []), { place, edit: made }]);
        }
      }
      return [...alone, ...[...together.values()].filter((made) => made.length > 1)];
    },
  };
}
