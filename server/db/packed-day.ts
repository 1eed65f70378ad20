/** Stands for a missing reading; no step of a house's meter comes near it. */
export const MISSING = -2_147_483_648;
const BYTES = 4;

/** A day's steps as little-endian 32-bit whole Wh; null becomes the least 32-bit number. Throws on a value that does not fit. */
export function packDay(values: readonly (number | null)[]): Buffer {
  const packed = Buffer.alloc(values.length * BYTES);
  for (const [index, value] of values.entries()) {
    if (value !== null && (!Number.isInteger(value) || value <= MISSING || value > 2_147_483_647)) {
      throw new RangeError(`not a step of a day: ${value}`);
    }
    packed.writeInt32LE(value ?? MISSING, index * BYTES);
  }
  return packed;
}

/** The steps that `packDay` packed. */
export function unpackDay(packed: Buffer): (number | null)[] {
  const values: (number | null)[] = new Array(packed.length / BYTES);
  for (let index = 0; index < values.length; index += 1) {
    const value = packed.readInt32LE(index * BYTES);
    values[index] = value === MISSING ? null : value;
  }
  return values;
}
