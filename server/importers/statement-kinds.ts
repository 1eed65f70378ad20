import type { PrintedLine } from '#shared/facts/papers.ts';
import { plainWords } from './statement-words.ts';

/**
 * Everyday words for the kinds of line. A late fee, a deposit and a payment plan's instalment are not charges for electricity and are
 * kept apart with water and refuse.
 */
const KIND_WORDS: Record<PrintedLine['kind'], readonly string[]> = {
  import: [
    'import',
    'energy',
    'energy charge',
    'energy used',
    'energy delivered',
    'delivered',
    'electricity',
    'bought',
  ],
  export: [
    'export',
    'export credit',
    'export earned',
    'energy received',
    'sent out',
    'solar credit',
    'net metering credit',
  ],
  credit: [
    'credit',
    'credit used',
    'credit applied',
    'credit brought in',
    'bank credit',
    'credit bank',
    'credit from bank',
  ],
  incentive: ['incentive', 'production incentive', 'production credit', 'generation credit'],
  fixed: [
    'fixed',
    'fixed charge',
    'customer charge',
    'basic charge',
    'service charge',
    'basic service',
    'access charge',
  ],
  nonbypassable: ['nonbypassable', 'non bypassable', 'non bypassable charge', 'public benefits', 'public purpose'],
  demand: ['demand', 'demand charge', 'capacity charge'],
  tax: [
    'tax',
    'taxes',
    'sales tax',
    'state tax',
    'city tax',
    'county tax',
    'utility tax',
    'franchise fee',
    'gross receipts tax',
  ],
  minimum: ['minimum', 'minimum bill', 'minimum charge'],
  trueup: ['trueup', 'true up', 'annual settlement', 'surplus paid'],
  adjustment: [
    'adjustment',
    'correction',
    'fuel',
    'fuel adjustment',
    'power cost adjustment',
    'rider',
    'rebate',
    'discount',
  ],
  previousBalance: ['previous balance', 'balance forward'],
  payment: ['payment', 'payments', 'payment received', 'payments received'],
  otherService: [
    'other',
    'other service',
    'water',
    'wastewater',
    'sewer',
    'sewage',
    'refuse',
    'garbage',
    'trash',
    'solid waste',
    'sanitation',
    'recycling',
    'stormwater',
    'storm water',
    'storm drain',
    'drainage',
    'gas',
    'natural gas',
    'internet',
    'broadband',
    'street light',
    'street lighting',
    'lighting',
    'area light',
    'yard light',
    'security light',
    'late fee',
    'late charge',
    'late payment charge',
    'penalty',
    'returned check fee',
    'returned payment fee',
    'reconnection fee',
    'deposit',
    'security deposit',
    'instalment',
    'installment',
    'payment plan',
    'payment arrangement',
    'donation',
    'round up',
  ],
};

const KIND_BY_WORD = new Map<string, PrintedLine['kind']>();
for (const [kind, words] of Object.entries(KIND_WORDS)) {
  for (const word of words) KIND_BY_WORD.set(word, kind as PrintedLine['kind']);
}

/** The kinds offered where a word was not understood. */
export const OFFERED_ITEMS = [
  'import',
  'export credit',
  'credit used',
  'incentive',
  'customer charge',
  'non-bypassable',
  'demand',
  'tax',
  'minimum',
  'true-up',
  'adjustment',
  'other service',
] as const;

export const KNOWN_ITEMS: readonly string[] = [...KIND_BY_WORD.keys()];

/** Services that a tax is printed on by name. "Gas and electric tax" is on electricity too, and stays. */
const OTHER_SERVICE =
  /\b(water|waste ?water|sew(er|age)|refuse|garbage|trash|recycling|storm ?water|drainage|solid waste|sanitation|gas|internet|broadband)\b/i;
const ELECTRICITY = /\b(electric\w*|energy|power|kwh)\b/i;

/** A tax whose label says it is on another service is kept apart with that service; the owner can say otherwise in the check. */
export function keptApart(kind: PrintedLine['kind'], label: string): PrintedLine['kind'] {
  return kind === 'tax' && OTHER_SERVICE.test(label) && !ELECTRICITY.test(label) ? 'otherService' : kind;
}

export function kindOf(text: string): PrintedLine['kind'] | null {
  return KIND_BY_WORD.get(plainWords(text)) ?? null;
}
