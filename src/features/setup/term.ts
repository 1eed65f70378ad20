export type TermUnit = 'years' | 'months';

/** A term as typed, in months. */
export function monthsOf(term: string, unit: TermUnit): number {
  return Number(term.trim()) * (unit === 'years' ? 12 : 1);
}

/** A term in months as people say it: whole years where it is whole years. */
export function termText(months: number | null): { term: string; termUnit: TermUnit } {
  if (months === null) return { term: '', termUnit: 'years' };
  return months % 12 === 0
    ? { term: String(months / 12), termUnit: 'years' }
    : { term: String(months), termUnit: 'months' };
}
