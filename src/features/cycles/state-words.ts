import type { CycleRow } from '#shared/api/cycles.ts';

/** A cycle's state in words: "balanced", "open, provisional", "differs". */
export function stateWords(row: Pick<CycleRow, 'state' | 'provisional' | 'estimated'>): string {
  const parts: string[] = [row.state];
  if (row.provisional) parts.push('provisional');
  if (row.estimated) parts.push('estimate');
  return parts.join(', ');
}
