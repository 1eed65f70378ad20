import type { SettledAmounts } from '../../settlement/settle.ts';
import type { Cause, CauseInput } from './cause.ts';
import type { Attempt, Hypothesis } from './edit.ts';
import { bankShort, overbilled } from './effect.ts';
import { HYPOTHESES, LAST_RESORTS } from './registry.ts';
import { openScene, type Scene } from './scene.ts';
import { tryAttempt } from './try-attempt.ts';

/**
 * Every single mistake that gives exactly what was billed: all cents, each bank and payout, the kWh where they are printed (ledger.md §4, "A cause is
 * found by trying"). Several where several do; none where the bill is right, where no one mistake explains it, or where the plan cannot settle the
 * cycles. A kWh figure that merely differs is named only where no mistake that would have made it is found.
 */
export function findCauses(input: CauseInput): Cause[] {
  const scene = openScene(input);
  if (scene === null) return [];
  const found = causesAmong(scene, HYPOTHESES);
  return found.length > 0 ? found : causesAmong(scene, LAST_RESORTS);
}

function causesAmong(scene: Scene, hypotheses: readonly Hypothesis[]): Cause[] {
  const causes: Cause[] = [];
  for (const { cause, attempts, overlooks } of hypotheses) {
    const ways: { attempt: Attempt; settled: SettledAmounts[] }[] = [];
    for (const attempt of attempts(scene)) {
      const settled = tryAttempt(scene, attempt, overlooks);
      if (settled) ways.push({ attempt, settled });
    }
    const [first, ...others] = ways;
    if (!first) continue;
    const words = sayAttempt(first.attempt, first.settled);
    const also = others.map((way) => sayAttempt(way.attempt, way.settled)).filter((said) => said !== words);
    const truth = scene.places.map((place) => place.truth);
    causes.push({
      cause,
      words,
      alsoWords: [...new Set(also)],
      cycles: first.attempt.map(({ place: { cycle } }) => ({ from: cycle.usage.from, to: cycle.usage.to })),
      overbilledCents: overbilled(truth, first.settled),
      bankShort: bankShort(truth, first.settled),
      found: Object.assign({}, ...first.attempt.map(({ edit }) => edit.found)),
    });
  }
  return causes;
}

function sayAttempt(attempt: Attempt, settled: readonly SettledAmounts[]): string {
  const said = attempt.flatMap(({ place, edit }) =>
    settled.slice(place.index, place.index + 1).map((cycle) => edit.words(cycle)),
  );
  return [...new Set(said)].join(' ');
}
