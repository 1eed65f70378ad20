import type { FieldErrors, FieldPath } from 'react-hook-form';
import type { StatementFormValues } from './statement-values.ts';

export type StatementMessage = { text: string; path: FieldPath<StatementFormValues> };

/** Every message of a tree of errors, each with its place in words and as a path. */
export function messagesOf(errors: FieldErrors<StatementFormValues>): StatementMessage[] {
  const found: StatementMessage[] = [];
  const walk = (node: unknown, path: string[]): void => {
    if (typeof node !== 'object' || node === null) return;
    if ('message' in node && typeof node.message === 'string') {
      found.push({ text: `${placeOf(path)}: ${node.message}`, path: path.join('.') as StatementMessage['path'] });
      return;
    }
    for (const [key, value] of Object.entries(node)) if (key !== 'ref') walk(value, [...path, key]);
  };
  walk(errors, []);
  return found;
}

const FIELD_WORDS: Record<string, string> = {
  from: 'Service from',
  to: 'Service to',
  days: 'Days',
  statementOn: 'Statement date',
  dueOn: 'Due on',
  importKwh: 'Bought',
  exportKwh: 'Sent out',
  productionKwh: 'Made',
  previousBalance: 'Previous balance',
  payments: 'Payments',
  due: 'Amount due',
  budget: 'Budget amount',
  budgetBalance: 'Budget balance',
  budgetSettled: 'Settlement',
  reason: 'Reason',
};
const ROW_WORDS: Record<string, string> = {
  open: 'brought in',
  close: 'carried on',
  sentOut: 'sent on',
  sentValue: 'what it saved',
};

function placeOf(path: string[]): string {
  const [head = '', index, field = ''] = path;
  if (index === undefined) return FIELD_WORDS[head] ?? head;
  const what = head === 'lines' ? 'Line' : head === 'reads' ? 'Read' : 'Bank';
  return `${what} ${Number(index) + 1}, ${ROW_WORDS[field] ?? field}`;
}
