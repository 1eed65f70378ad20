/**
 * A stream of whole numbers from a seed, the same for the same seed: 32 bits, one multiply and shift chain each (the generator known as mulberry32;
 * common practice, no source). Good enough to draw months by, not for secrets.
 */
export function drawing(seed: number): (below: number) => number {
  let state = seed >>> 0;
  return (below) => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    const drawn = (mixed ^ (mixed >>> 14)) >>> 0;
    return Math.floor((drawn * below) / 0x1_0000_0000);
  };
}
