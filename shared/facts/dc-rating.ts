import type { ArrayFacts } from './house.ts';

/** DC rating in watts: modules × watts, over all arrays (common practice, no source). Zero while no array is stated. */
export function dcWattsOf(arrays: readonly Pick<ArrayFacts, 'modules' | 'moduleWatts'>[]): number {
  return arrays.reduce((sum, array) => sum + array.modules * array.moduleWatts, 0);
}
