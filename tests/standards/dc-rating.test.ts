import { describe, expect, it } from 'vitest';
import { dcWattsOf } from '#shared/facts/dc-rating.ts';

describe('the DC rating of a roof', () => {
  // Common practice, no source: DC kW = modules × W / 1000, over all arrays.
  it('is modules × watts, added over the arrays', () => {
    const arrays = [
      { modules: 18, moduleWatts: 410 },
      { modules: 10, moduleWatts: 410 },
    ];
    expect(dcWattsOf(arrays) / 1000).toBe(11.48);
    expect(dcWattsOf([{ modules: 16, moduleWatts: 400 }]) / 1000).toBe(6.4);
    expect(dcWattsOf([])).toBe(0);
  });
});
