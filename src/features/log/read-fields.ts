import type { StatementBody } from '#shared/api/cycles.ts';
import type { ReadChannel, RegisterRead } from '#shared/facts/papers.ts';
import { parseDollars } from '#shared/units/cents.ts';
import { parseDay } from '#shared/units/day.ts';
import { parseKwh } from '#shared/units/energy.ts';
import { decimal, money } from '#src/lib/format.ts';
import { plainDecimal, textOf } from '#src/lib/typed-values.ts';

/** A value in an editable field. `put` gives the statement with another text in its place, or a sentence on what to write. */
export type ReadField = {
  name: string;
  text: string;
  type: 'date' | 'number' | 'text';
  put: (text: string) => StatementBody | string;
};

export const CHANNEL_WORDS: Record<ReadChannel, string> = {
  import: 'Import',
  export: 'Export',
  production: 'Production',
};
export const KWH_FIELDS = { import: 'importWh', export: 'exportWh', production: 'productionWh' } as const;

export function registerLabel(read: RegisterRead, reads: RegisterRead[]): string {
  const several = reads.filter((one) => one.channel === read.channel).length > 1;
  return `${CHANNEL_WORDS[read.channel]} register${several ? `, ${read.meter}` : ''}`;
}

export function lineLabel(line: StatementBody['lines'][number]): string {
  if (line.quantity === null || line.rate === null || line.unit !== 'kWh') return line.label;
  return `${line.label}, ${decimal(line.quantity)} kWh at ${line.rate}`;
}

export function dateFields(statement: StatementBody): ReadField[] {
  const put = (name: 'from' | 'to') => (text: string) => {
    const day = parseDay(text);
    if (day === null) return 'Choose a date.';
    const next = { ...statement, [name]: day };
    if (next.from >= next.to) return 'The later read must come after the earlier one.';
    // Reads that ran over the whole cycle follow its dates.
    const reads = statement.reads.map((read) => (read[name] === statement[name] ? { ...read, [name]: day } : read));
    return { ...next, reads };
  };
  return [
    { name: 'Service from', text: statement.from, type: 'date', put: put('from') },
    { name: 'Service to', text: statement.to, type: 'date', put: put('to') },
  ];
}

export function readFields(statement: StatementBody, index: number): ReadField[] {
  const read = statement.reads[index];
  if (!read) return [];
  const put = (name: 'previous' | 'current') => (text: string) => {
    const plain = plainDecimal(text);
    if (plain === null || plain.startsWith('-')) return 'Write the read as the meter shows it.';
    return { ...statement, reads: statement.reads.map((one, at) => (at === index ? { ...one, [name]: plain } : one)) };
  };
  const label = registerLabel(read, statement.reads);
  return [
    { name: `${label}, previous`, text: read.previous, type: 'number', put: put('previous') },
    { name: `${label}, current`, text: read.current, type: 'number', put: put('current') },
  ];
}

export function lineField(statement: StatementBody, index: number): ReadField {
  const line = statement.lines[index];
  return {
    name: line?.label ?? '',
    text: line ? money(line.amountCents) : '',
    type: 'text',
    put: (text) => {
      const amountCents = parseDollars(text);
      if (amountCents === null) return 'Write an amount such as 14.50.';
      return { ...statement, lines: statement.lines.map((one, at) => (at === index ? { ...one, amountCents } : one)) };
    },
  };
}

export function bankFields(statement: StatementBody, index: number): ReadField[] {
  const bank = statement.banks[index];
  const put = (name: 'open' | 'close') => (text: string) => {
    const plain = text.trim() === '' ? null : plainDecimal(text);
    if (plain === null && text.trim() !== '') return 'Write a number such as 31.77.';
    return { ...statement, banks: statement.banks.map((one, at) => (at === index ? { ...one, [name]: plain } : one)) };
  };
  return [
    { name: 'Credit bank, brought in', text: bank?.open ?? '', type: 'text', put: put('open') },
    { name: 'Credit bank, carried on', text: bank?.close ?? '', type: 'text', put: put('close') },
  ];
}

export function moneyField(
  statement: StatementBody,
  name: 'previousBalanceCents' | 'paymentsCents' | 'amountDueCents',
  label: string,
): ReadField {
  const amount = statement[name];
  return {
    name: label,
    text: amount === null ? '' : money(amount),
    type: 'text',
    put: (text) => {
      const read = parseDollars(text);
      return read === null ? 'Write an amount such as 52.01.' : { ...statement, [name]: read };
    },
  };
}

/** A figure of the budget plan. Its balance may be left empty: not every bill prints it. */
export function budgetField(
  statement: StatementBody,
  name: 'instalmentCents' | 'balanceCents' | 'settledCents',
  label: string,
): ReadField {
  const { budget } = statement;
  const amount = budget?.[name] ?? null;
  return {
    name: label,
    text: amount === null ? '' : money(amount),
    type: 'text',
    put: (text) => {
      if (budget === null) return statement;
      const read = parseDollars(text);
      if (name !== 'instalmentCents' && text.trim() === '')
        return { ...statement, budget: { ...budget, [name]: null } };
      return read === null ? 'Write an amount such as 118.00.' : { ...statement, budget: { ...budget, [name]: read } };
    },
  };
}

export function kwhField(statement: StatementBody, channel: ReadChannel): ReadField {
  const name = KWH_FIELDS[channel];
  return {
    name: `${CHANNEL_WORDS[channel]}, kWh`,
    text: textOf.wh(statement[name]),
    type: 'number',
    put: (text) => {
      const read = parseKwh(text);
      return read === null ? 'Write kWh as a number.' : { ...statement, [name]: read };
    },
  };
}
