import { type Cents, dollarsText } from '../units/cents.ts';
import { kwhText, type Wh } from '../units/energy.ts';
import type { Source, WorkingInput } from '../working.ts';

/** What the owner stated in a form: the facts do not keep who typed each field, so the form is named. */
export function stated(form: string): Source {
  return { kind: 'figure', name: form };
}

export function rule(name: string, version: string): Source {
  return { kind: 'rule', name, version };
}

export function usdInput(name: string, label: string, amount: Cents, source: Source): WorkingInput {
  return { name, label, value: dollarsText(amount), unit: 'USD', source };
}

export function usdListInput(name: string, label: string, amounts: readonly Cents[], source: Source): WorkingInput {
  return { name, label, value: amounts.map(dollarsText), unit: 'USD', source };
}

export function kwhInput(name: string, label: string, amount: Wh, source: Source): WorkingInput {
  return { name, label, value: kwhText(amount), unit: 'kWh', source };
}

/** A count or a plain rate: days, months, a fraction, USD per kWh. */
export function plainInput(name: string, label: string, value: string, unit: string, source: Source): WorkingInput {
  return { name, label, value, unit, source };
}
