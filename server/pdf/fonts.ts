import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';

/** The weights a paper is set in. */
export type Face = 'text' | 'strong' | 'total';
/** The alphabets of one weight, in the order in which a letter is looked for. */
export type Alphabet = 'latin' | 'latin-ext' | 'greek' | 'cyrillic';

export const ALPHABETS: readonly Alphabet[] = ['latin', 'latin-ext', 'greek', 'cyrillic'];
const WEIGHTS: Record<Face, number> = { text: 400, strong: 600, total: 700 };
export const FACES = Object.keys(WEIGHTS) as Face[];

const require = createRequire(import.meta.url);
const files = new Map<string, Buffer>();

/** The font the screens are set in, as a file to embed; read once. */
export function fontFile(face: Face, alphabet: Alphabet): Buffer {
  const name = `source-sans-3-${alphabet}-${WEIGHTS[face]}-normal.woff`;
  const known = files.get(name);
  if (known) return known;
  const read = readFileSync(require.resolve(`@fontsource/source-sans-3/files/${name}`));
  files.set(name, read);
  return read;
}
