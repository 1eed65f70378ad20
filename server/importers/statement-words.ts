import type { ReadChannel } from '#shared/facts/papers.ts';
import type { LineUnit } from '#shared/settlement/settlement.ts';

/** A word as it is compared: lower case, one space between words, no punctuation. */
export function plainWords(text: string): string {
  return text
    .toLowerCase()
    .replace(/[^a-z0-9$%]+/g, ' ')
    .trim();
}

export const RECORDS = ['statement', 'read', 'line', 'bank', 'balance'] as const;
export type StatementRecord = (typeof RECORDS)[number];

const RECORD_WORDS: Record<string, StatementRecord> = {
  statement: 'statement',
  bill: 'statement',
  read: 'read',
  reading: 'read',
  'meter read': 'read',
  'meter reading': 'read',
  line: 'line',
  charge: 'line',
  credit: 'line',
  bank: 'bank',
  'credit bank': 'bank',
  balance: 'balance',
  account: 'balance',
};

export function recordOf(text: string): StatementRecord | null {
  return RECORD_WORDS[plainWords(text)] ?? null;
}

const CHANNEL_WORDS: Record<string, ReadChannel> = {
  import: 'import',
  delivered: 'import',
  bought: 'import',
  export: 'export',
  received: 'export',
  'sent out': 'export',
  production: 'production',
  generation: 'production',
  made: 'production',
};

export function channelOf(text: string): ReadChannel | null {
  return CHANNEL_WORDS[plainWords(text)] ?? null;
}

export type BalanceItem =
  | 'previousBalance'
  | 'payments'
  | 'amountDue'
  | 'budgetAmount'
  | 'budgetBalance'
  | 'budgetSettlement';
const BALANCE_WORDS: Record<string, BalanceItem> = {
  'previous balance': 'previousBalance',
  'balance forward': 'previousBalance',
  'last bill': 'previousBalance',
  payment: 'payments',
  payments: 'payments',
  'payment received': 'payments',
  'payments received': 'payments',
  'amount due': 'amountDue',
  'total due': 'amountDue',
  'total amount due': 'amountDue',
  due: 'amountDue',
  budget: 'budgetAmount',
  'budget amount': 'budgetAmount',
  'budget bill': 'budgetAmount',
  'budget billing': 'budgetAmount',
  'budget billing amount': 'budgetAmount',
  'budget payment': 'budgetAmount',
  'budget plan amount': 'budgetAmount',
  'level payment': 'budgetAmount',
  'levelized amount': 'budgetAmount',
  'average amount': 'budgetAmount',
  'budget balance': 'budgetBalance',
  'budget billing balance': 'budgetBalance',
  'your budget balance': 'budgetBalance',
  'deferred balance': 'budgetBalance',
  'levelized balance': 'budgetBalance',
  'budget settlement': 'budgetSettlement',
  'budget settle up': 'budgetSettlement',
  'budget true up': 'budgetSettlement',
  'budget year end': 'budgetSettlement',
};

export function balanceItemOf(text: string): BalanceItem | null {
  return BALANCE_WORDS[plainWords(text)] ?? null;
}

const UNIT_WORDS: Record<string, LineUnit> = {
  kwh: 'kWh',
  kw: 'kW',
  day: 'day',
  days: 'day',
  cycle: 'cycle',
  month: 'cycle',
  months: 'cycle',
  bill: 'cycle',
  usd: 'USD',
  $: 'USD',
  dollar: 'USD',
  dollars: 'USD',
};

export function unitOf(text: string): LineUnit | null {
  return UNIT_WORDS[plainWords(text)] ?? null;
}

const YES = new Set(['yes', 'y', 'true', '1']);
const NO = new Set(['no', 'n', 'false', '0']);

export function yesOrNo(text: string): boolean | null {
  const word = plainWords(text);
  return YES.has(word) ? true : NO.has(word) ? false : null;
}

const READ_TYPES: Record<string, 'actual' | 'estimated'> = {
  actual: 'actual',
  a: 'actual',
  read: 'actual',
  estimated: 'estimated',
  estimate: 'estimated',
  est: 'estimated',
  e: 'estimated',
};

export function readTypeOf(text: string): 'actual' | 'estimated' | null {
  return READ_TYPES[plainWords(text)] ?? null;
}

/** A bank's id: as written where it is one (`creditBank`), else its words run together ("credit bank" → `creditBank`). */
export function bankIdOf(text: string): string | null {
  const written = text.trim() === '' ? 'credit bank' : text.trim();
  if (/^[a-z][A-Za-z0-9]*$/.test(written)) return written;
  const words = plainWords(written).replace(/[$%]/g, '').split(' ').filter(Boolean);
  const id = words
    .map((word, index) => (index === 0 ? word : `${word.slice(0, 1).toUpperCase()}${word.slice(1)}`))
    .join('');
  return /^[a-z][A-Za-z0-9]*$/.test(id) ? id : null;
}
