import type { Fault } from '#shared/problem.ts';

const LONGEST_FOUND = 60;

/** The text as found, short enough to show in a sentence. */
export function shortened(text: string): string {
  const flat = text.replace(/\s+/g, ' ').trim();
  return flat.length > LONGEST_FOUND ? `${flat.slice(0, LONGEST_FOUND - 1)}…` : flat;
}

/** A fault in a file. `column` is the header as the file writes it. */
export function fileFault(
  fileName: string,
  code: string,
  message: string,
  at: { row?: number | null; column?: string | null; found?: string | null } = {},
): Fault {
  const column = at.column ?? null;
  return {
    code,
    field: column,
    fileName,
    row: at.row ?? null,
    column,
    found: at.found === undefined || at.found === null ? null : shortened(at.found),
    message,
  };
}

/** Edits (a letter put in, taken out or changed) between two words. */
function editsBetween(a: string, b: string): number {
  let before = Array.from({ length: b.length + 1 }, (_, index) => index);
  for (let i = 1; i <= a.length; i += 1) {
    const now = [i];
    for (let j = 1; j <= b.length; j += 1) {
      const change = (before[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1);
      now.push(Math.min(change, (before[j] ?? 0) + 1, (now[j - 1] ?? 0) + 1));
    }
    before = now;
  }
  return before[b.length] ?? 0;
}

/** The known name nearest to what was written; null when none is near (over half its letters would change). */
export function nearestName(written: string, known: readonly string[]): string | null {
  const word = written.slice(0, 40);
  let best: string | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (const name of known) {
    const edits = editsBetween(word, name);
    if (edits < least) {
      least = edits;
      best = name;
    }
  }
  return best !== null && least <= Math.max(2, best.length / 2) ? best : null;
}
