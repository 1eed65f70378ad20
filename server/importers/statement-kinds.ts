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
    'sewer',
    'refuse',
    'garbage',
    'trash',
    'recycling',
    'stormwater',
    'gas',
    'internet',
    'street light',
    'late fee',
    'late charge',
    'deposit',
    'instalment',
    'installment',
    'payment plan',
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

export function kindOf(text: string): PrintedLine['kind'] | null {
  return KIND_BY_WORD.get(plainWords(text)) ?? null;
}
