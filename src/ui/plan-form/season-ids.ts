import type { PlanForm } from './plan-form.ts';

/** The plan's own id of a season, by the id it has in the form. */
export type Ids = (season: string) => string;

/** A season's id in the plan: its own while it keeps its name, else its name as an id. */
export function seasonIds(form: PlanForm): Ids {
  const made = new Map<string, string>();
  for (const { id, name } of form.seasons) {
    const wanted = name.trim() === seasonName(id) ? id : camelId(name) || id;
    const taken = [...made.values()];
    made.set(id, taken.includes(wanted) ? `${wanted}${taken.length + 1}` : wanted);
  }
  return (season) => made.get(season) ?? season;
}

/** "highSummer" as people write it: "High summer". */
export function seasonName(id: string): string {
  const words = id.replace(/([a-z0-9])([A-Z])/g, (_, a: string, b: string) => `${a} ${b.toLowerCase()}`);
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** A name as an id of the plan's language: "High summer" → "highSummer". Empty where it holds no letter. */
export function camelId(name: string): string {
  const words = name
    .normalize('NFD')
    .split(/[^A-Za-z0-9]+/)
    .filter((word) => word !== '');
  const joined = words
    .map((word, index) =>
      index === 0 ? word.toLowerCase() : word.charAt(0).toUpperCase() + word.slice(1).toLowerCase(),
    )
    .join('');
  return joined.replace(/^[0-9]+/, '');
}
