import type { Fault } from '#shared/problem.ts';

/**
 * A fault of a file as its place and what is wrong there, the place said once: it is taken off the message where the message begins with it. Null
 * where the message itself tells the place in a sentence ("Row 4 has more cells than…").
 */
export function faultWords(fault: Fault): { place: string | null; text: string } {
  const row = fault.row === null ? null : `Row ${fault.row}`;
  const place = [row, fault.column].filter((part) => part !== null && part !== '').join(', ');
  for (const named of [place, row]) {
    if (named && fault.message.startsWith(`${named}: `)) {
      return { place, text: capital(fault.message.slice(named.length + 2)) };
    }
  }
  if (row !== null && fault.message.startsWith(row)) return { place: null, text: fault.message };
  return { place: place === '' ? 'The file' : place, text: capital(fault.message) };
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
