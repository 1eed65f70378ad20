import type { FieldErrors, FieldValues, Resolver } from 'react-hook-form';
import { ApiError } from './api.ts';
import { errorWords } from './problem-words.ts';

/** A typed value that cannot be read: the field's path (`lines.0.amountCents`) and what to do. */
export type ValueFault = { path: string; message: string };
/** What reading a form's texts gives: the body to send, or every fault. */
export type Reading<B> = { ok: true; body: B } | { ok: false; faults: ValueFault[] };

/** The form library's resolver for a function that reads texts as a body; the texts stay as typed. */
export function resolverOf<V extends FieldValues>(read: (values: V) => Reading<unknown>): Resolver<V> {
  return (values) => {
    const reading = read(values);
    return reading.ok ? { values, errors: {} } : { values: {}, errors: nested<V>(reading.faults) };
  };
}

function nested<V extends FieldValues>(faults: readonly ValueFault[]): FieldErrors<V> {
  const errors: Record<string, unknown> = {};
  for (const { path, message } of faults) {
    const keys = path.split('.');
    const last = keys.pop() ?? path;
    let at = errors;
    for (const key of keys) {
      const next = at[key] ?? {};
      at[key] = next;
      at = next as Record<string, unknown>;
    }
    at[last] = { type: 'value', message };
  }
  return errors as FieldErrors<V>;
}

/** Collects faults while texts are read one by one, so that none hides another. */
export class FaultList {
  readonly faults: ValueFault[] = [];

  add(path: string, message: string): null {
    if (!this.faults.some((fault) => fault.path === path)) this.faults.push({ path, message });
    return null;
  }

  /** A value that may be left empty. */
  optional<T>(text: string, read: (text: string) => T | null, path: string, message: string): T | null {
    return text.trim() === '' ? null : (read(text) ?? this.add(path, message));
  }

  /** A value that must be there; `instead` stands in while the fault is on the list. */
  needed<T>(text: string, read: (text: string) => T | null, path: string, message: string, instead: T): T {
    const value = this.optional(text, read, path, message);
    if (value !== null) return value;
    this.add(path, 'This is needed.');
    return instead;
  }

  reading<B>(body: B): Reading<B> {
    return this.faults.length > 0 ? { ok: false, faults: this.faults } : { ok: true, body };
  }
}

/** Why the server refused a form, as lines for its summary. */
export function refusalLines(error: unknown): { text: string }[] {
  const faults = error instanceof ApiError ? error.problem.faults : [];
  const lines = faults.length > 0 ? faults.map((fault) => fault.message) : [errorWords(error)];
  return [...new Set(lines)].map((text) => ({ text }));
}
