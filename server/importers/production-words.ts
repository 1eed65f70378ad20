import type { ProductionMapping } from '#shared/api/log.ts';
import type { IntervalChannel } from '#shared/facts/papers.ts';

export type Unit = ProductionMapping['unit'];

const CHANNEL_WORDS: Record<'made' | 'in' | 'out', RegExp> = {
  made: /produc|generat|\bpv\b|solar|yield|inverter|\bmade\b/i,
  in: /import|purchas|bought|from grid|grid supply|consum|delivered|usage/i,
  out: /export|feed|sold|surplus|to grid|sent|received|return/i,
};
const WORDS_FOR: Record<IntervalChannel, 'made' | 'in' | 'out'> = {
  production: 'made',
  monitor: 'made',
  import: 'in',
  export: 'out',
};
/** Columns that stand beside energy in such files and are none. */
export const NOT_ENERGY =
  /%|percent|temp|irradi|volt|current|amp|freq|factor|normal|p\.u|status|quality|flag|serial|\bid\b|latitude|longitude|price|cost|usd|\$|co2|humidity|wind|mwh|\bsoc\b/i;
const UNIT_WORD = /(?:^|[^a-z])(kwh|kw|wh|w)(?:$|[^a-z])/i;
const UNITS: Record<string, Unit> = { kwh: 'kWh', kw: 'kW', wh: 'Wh', w: 'W' };
const UNIT_WORDS_LONG: [RegExp, Unit][] = [
  [/kilowatt[- ]?hours?/i, 'kWh'],
  [/watt[- ]?hours?/i, 'Wh'],
  [/kilowatts?/i, 'kW'],
  [/watts?/i, 'W'],
];

/** The unit a text names: `(kWh)`, `[W]`, `power_kw`, `watt hours`; null when it names none. */
export function unitIn(text: string): Unit | null {
  const match = UNIT_WORD.exec(text.replaceAll('_', ' '));
  if (match?.[1]) return UNITS[match[1].toLowerCase()] ?? null;
  return UNIT_WORDS_LONG.find(([words]) => words.test(text))?.[1] ?? null;
}

/** How well a column's words fit the wanted channel; only the order of such scores matters. */
export function energyScore(words: string, channel: IntervalChannel): number {
  const want = WORDS_FOR[channel];
  let score = 0;
  for (const [kind, pattern] of Object.entries(CHANNEL_WORDS)) {
    if (pattern.test(words)) score += kind === want ? 10 : -6;
  }
  const unit = unitIn(words);
  if (unit === 'kWh' || unit === 'Wh') score += 4;
  if (unit === 'kW' || unit === 'W') score += 3;
  if (/energy|kwh/i.test(words)) score += 2;
  if (/power/i.test(words)) score += 1;
  if (/total|lifetime|cumulat|register|reading/i.test(words)) score -= 1;
  return score;
}

/** How well a column's words fit the start of a step in the house's own clock. */
export function timeScore(words: string): number {
  let score = 0;
  if (/start|begin|from|local/i.test(words)) score += 2;
  if (/\bend|\bto\b|until|finish/i.test(words)) score -= 1;
  if (/utc|gmt/i.test(words)) score -= 1;
  return score;
}
