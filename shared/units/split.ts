/**
 * Splits a whole total by weights into whole parts that add up to it exactly (largest remainder first, ties to the earlier part).
 * Weights are non-negative and not all zero.
 */
export function splitWhole(total: number, weights: readonly number[]): number[] {
  const whole = weights.reduce((sum, weight) => sum + weight, 0);
  if (!(whole > 0) || weights.some((weight) => weight < 0)) throw new RangeError('weights must be positive');
  const size = Math.abs(total);
  const exact = weights.map((weight) => (size * weight) / whole);
  const parts = exact.map(Math.floor);
  let left = size - parts.reduce((sum, part) => sum + part, 0);
  const order = exact
    .map((value, index) => ({ index, rest: value - Math.floor(value) }))
    .sort((a, b) => b.rest - a.rest || a.index - b.index);
  for (const { index } of order) {
    if (left <= 0) break;
    parts[index] = (parts[index] ?? 0) + 1;
    left -= 1;
  }
  return parts.map((part) => (total < 0 && part !== 0 ? -part : part));
}
