/** The colours a chart draws with, read from the page's own tokens so that both themes and print follow. */
export type ChartTokens = {
  color: (token: string) => string;
  /** The same colour, see-through; `share` 0–1. */
  tint: (token: string, share: number) => string;
  fontFamily: string;
};

/** Reads the tokens as they stand now. A token that does not exist is a bug. */
export function readTokens(): ChartTokens {
  const style = getComputedStyle(document.documentElement);
  const color = (token: string): string => {
    const value = style.getPropertyValue(token).trim();
    if (value === '') throw new Error(`no such token: ${token}`);
    return value;
  };
  return {
    color,
    tint: (token, share) => `color-mix(in srgb, ${color(token)} ${Math.round(share * 100)}%, transparent)`,
    fontFamily: getComputedStyle(document.body).fontFamily,
  };
}

const WATCHED = ['(prefers-color-scheme: dark)', 'print'];

/** Calls back whenever the tokens may have changed: another colour scheme, or paper instead of a screen. */
export function watchTokens(changed: () => void): () => void {
  const lists = WATCHED.map((query) => window.matchMedia(query));
  for (const list of lists) list.addEventListener('change', changed);
  return () => {
    for (const list of lists) list.removeEventListener('change', changed);
  };
}
