/** "1 row", "1,204 rows" */
export function countOf(count: number, thing: string): string {
  return `${count.toLocaleString('en-US')} ${thing}${count === 1 ? '' : 's'}`;
}

const NUMBERS = ['none', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine'];

/** A small number in words, as a sentence has it. */
export function numberWord(count: number): string {
  return NUMBERS[count] ?? count.toLocaleString('en-US');
}
