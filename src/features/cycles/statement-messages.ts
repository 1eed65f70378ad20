import type { FieldErrors } from 'react-hook-form';
import type { StatementValues } from './statement-values.ts';

/** Every message of a tree of errors, once. */
export function messagesOf(errors: FieldErrors<StatementValues>): { text: string }[] {
  const found = new Map<string, string>();
  const walk = (node: unknown, path: string[]): void => {
    if (typeof node !== 'object' || node === null) return;
    if ('message' in node && typeof node.message === 'string') {
      found.set(path.join('.'), `${placeOf(path)}: ${node.message}`);
      return;
    }
    for (const [key, value] of Object.entries(node)) if (key !== 'ref') walk(value, [...path, key]);
  };
  walk(errors, []);
  return [...found.values()].map((text) => ({ text }));
}

const FIELD_WORDS: Record<string, string> = {
  from: 'First day',
  to: 'Last day',
  printedDays: 'Days printed',
  statementOn: 'Statement date',
  dueOn: 'Due date',
  importWh: 'Import',
  exportWh: 'Export',
  productionWh: 'Production',
  previousBalanceCents: 'Previous balance',
  paymentsCents: 'Payments',
  amountDueCents: 'Amount due',
  amountCents: 'Amount',
  label: 'As printed',
  reason: 'Reason',
};

function placeOf(path: string[]): string {
  const [head = '', index, field = ''] = path;
  if (index === undefined) return FIELD_WORDS[head] ?? head;
  const what = head === 'lines' ? 'Line' : head === 'reads' ? 'Read' : 'Bank';
  return `${what} ${Number(index) + 1}, ${(FIELD_WORDS[field] ?? field).toLowerCase()}`;
}
