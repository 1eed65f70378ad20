/**
 * The first index from which every value is zero or more to the end: the lasting crossing, not the first touch. Null when the last value is below
 * zero or there is none.
 */
export function lastingCrossing(values: ArrayLike<number>): number | null {
  let index = values.length;
  while (index > 0 && Number(values[index - 1]) >= 0) index -= 1;
  return index === values.length ? null : index;
}

/** The first index whose value is zero or more, whatever comes after; null when there is none. */
export function firstCrossing(values: readonly number[]): number | null {
  const index = values.findIndex((value) => value >= 0);
  return index === -1 ? null : index;
}
