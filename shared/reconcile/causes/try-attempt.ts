import { type SettledAmounts, settleAmounts } from '../../settlement/settle.ts';
import type { Attempt, Edit, Hypothesis, Place } from './edit.ts';
import { reproducesKwh, reproducesMoney } from './reproduces.ts';
import type { Scene } from './scene.ts';

/**
 * Settles the cycles again with the mistake made; null unless every one comes out as billed. Cycles before the first edit stand as they truly are
 * and were billed so; each later one opens with what the mistake left behind.
 */
export function tryAttempt(
  scene: Scene,
  attempt: Attempt,
  overlooks: Hypothesis['overlooks'],
): SettledAmounts[] | null {
  const first = Math.min(...attempt.map(({ place }) => place.index));
  if (first > scene.firstOff) return null;
  const settled: SettledAmounts[] = [];
  let { opening } = scene;
  for (const place of scene.places) {
    const edit = attempt.find((one) => one.place === place)?.edit ?? null;
    const made = place.index < first ? place.truth : settleEdited(place, edit, opening, overlooks);
    if (made === null) return null;
    settled.push(made);
    opening = made.closing;
  }
  return settled;
}

function settleEdited(
  place: Place,
  edit: Edit | null,
  opening: Place['opening'],
  overlooks: Hypothesis['overlooks'],
): SettledAmounts | null {
  const { cycle, sums, truth } = place;
  const usage = edit?.usage ?? cycle.usage;
  if (!overlooks.kWh && !reproducesKwh(cycle.billed, usage)) return null;
  const made = settleAmounts(edit?.plan ?? cycle.plan, edit?.opening ? edit.opening(opening) : opening, usage);
  if (!made.ok) return null;
  const settled = edit?.after ? edit.after(made.value) : made.value;
  if (settled === null) return null;
  const { days } = cycle.billed;
  const trueDays = truth.settlement.days;
  if (days !== null && days !== settled.settlement.days && !(overlooks.days && days === trueDays)) return null;
  return reproducesMoney(sums, settled) ? settled : null;
}
