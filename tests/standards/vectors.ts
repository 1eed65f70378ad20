import { readFileSync } from 'node:fs';
import { join } from 'node:path';

/** Reads a file of vectors from `VECTORS_DIR`, by default the committed folder. */
export function readVectors<T>(fileName: string): T[] {
  const folder = process.env.VECTORS_DIR ?? 'fixtures/standards';
  const read = JSON.parse(readFileSync(join(folder, fileName), 'utf8')) as { vectors: T[] };
  return read.vectors;
}
