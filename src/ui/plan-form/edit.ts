import { createContext, useContext, useMemo, useState } from 'react';
import { withPricesCarried } from './carry-prices.ts';
import type { PlanForm } from './plan-form.ts';

/** A fault of a field, by its path in the form. */
export type FormFault = { path: string; message: string };

/** What every part of the plan's form works with. */
export type PlanEdit = {
  form: PlanForm;
  set(changes: Partial<PlanForm>): void;
  /** Attributes and error of a text field: its name, value, handlers. */
  text(path: string, value: string, set: (text: string) => void): TextProps;
  error(path: string): string | undefined;
  /** A name for a group of radio buttons, of its own on the page. */
  name(path: string): string;
};
type TextProps = {
  name: string;
  value: string;
  error: string | undefined;
  onChange: (event: { target: { value: string } }) => void;
  onBlur: () => void;
};

const Edit = createContext<PlanEdit | null>(null);
export const PlanEditProvider = Edit;

export function usePlanEdit(): PlanEdit {
  const edit = useContext(Edit);
  if (edit === null) throw new Error('a part of the plan’s form stands outside it');
  return edit;
}

/**
 * Faults are shown once a field has been left, or all of them after a try to save; what the plan's language refuses (`refused`, by the plan's own
 * paths, which are the form's) at once. `prefix` makes field names unique on a page.
 */
export function useMakeEdit(
  form: PlanForm,
  onChange: (form: PlanForm) => void,
  faults: readonly FormFault[],
  refused: readonly FormFault[],
  showAll: boolean,
  prefix: string,
): PlanEdit {
  const [left, setLeft] = useState<ReadonlySet<string>>(new Set());
  return useMemo(() => {
    const at = (list: readonly FormFault[], path: string) => list.find((fault) => fault.path === path)?.message;
    const error = (path: string) => (showAll || left.has(path) ? at(faults, path) : undefined) ?? at(refused, path);
    return {
      form,
      error,
      name: (path) => `${prefix}.${path}`,
      set: (changes) => onChange(withPricesCarried(form, { ...form, ...changes })),
      text: (path, value, set) => ({
        name: `${prefix}.${path}`,
        value,
        error: error(path),
        onChange: (event) => set(event.target.value),
        onBlur: () => setLeft((before) => (before.has(path) ? before : new Set(before).add(path))),
      }),
    };
  }, [form, onChange, faults, refused, showAll, prefix, left]);
}

/** The list with one item changed. */
export function changed<T>(list: readonly T[], index: number, changes: Partial<T>): T[] {
  return list.map((item, at) => (at === index ? { ...item, ...changes } : item));
}

export function without<T>(list: readonly T[], index: number): T[] {
  return list.filter((_, at) => at !== index);
}

/** A list of names with one ticked or taken out; what was there keeps its order. */
export function toggled<T>(list: readonly T[], item: T, on: boolean): T[] {
  return on ? [...list.filter((one) => one !== item), item] : list.filter((one) => one !== item);
}
