import { randomInt } from 'node:crypto';

const CONSONANTS = 'bdfghjklmnprstvz';
const VOWELS = 'aeiou';
const WORDS = 4;
const SYLLABLES = 3;

/** A whole number below a bound, from a source that cannot be guessed. */
export type Draw = (below: number) => number;

/**
 * A password a person can read off a screen and type: four words that are in no dictionary and four digits, as in "kalimo-tesura-bodane-vimeru-4071".
 * Twelve syllables out of 80 and four digits: 89 bits.
 */
export function readablePassword(draw: Draw = (below) => randomInt(below)): string {
  const syllable = () => `${CONSONANTS[draw(CONSONANTS.length)]}${VOWELS[draw(VOWELS.length)]}`;
  const word = () => Array.from({ length: SYLLABLES }, syllable).join('');
  const digits = Array.from({ length: 4 }, () => draw(10)).join('');
  return [...Array.from({ length: WORDS }, word), digits].join('-');
}
