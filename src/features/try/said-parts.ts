import type { Levers } from '#shared/facts/scenario.ts';

/** More levers than this are counted in the headline and not named: it stays in sight, and must leave room for what it is about. */
const MOST_NAMED = 3;

/** The difference in its parts: what is tried with its colon, the first thing it does, and the rest. */
export function saidParts(said: string, levers: Levers): { what: string; first: string; rest: string } {
  // What is tried may hold a colon in a plan's name; what it does holds none.
  const colon = said.lastIndexOf(': ') + 1;
  const does = said.slice(colon + 1);
  const comma = does.indexOf(', ');
  const cut = comma < 0 ? does.length - 1 : comma;
  const pulled = Object.values(levers).filter((lever) => lever !== null && lever !== false).length;
  return {
    what: pulled > MOST_NAMED ? `With these ${pulled} changes together:` : said.slice(0, colon),
    first: does.slice(0, cut),
    rest: does.slice(cut),
  };
}
