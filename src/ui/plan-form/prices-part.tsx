import { Field } from '../field.tsx';
import { AddRow, FormRow, Part } from '../rows.tsx';
import { changed, usePlanEdit, without } from './edit.ts';
import type { PlanForm } from './plan-form.ts';
import { type PricedItem, pricedItems } from './price-cells.ts';

/** The prices of a plan by date: a complete first row, then what changed. */
export function PricesPart() {
  const { form, set, text, error } = usePlanEdit();
  const refusedOf = (item: PricedItem) => error(ratesPath(form, item.key));
  const items = pricedItems(form);
  const single = items.filter(({ cells }) => cells.length === 1);
  const several = items.filter(({ cells }) => cells.length > 1);
  const { prices } = form;
  return (
    <Part title="Prices by date" hint="The first row is complete. In a later one fill in only what changed that day.">
      {prices.map((row, place) => {
        const price = (item: PricedItem, key: string, label: string) => (
          <Field
            key={key}
            label={label}
            inputMode="decimal"
            unit={item.unit}
            placeholder={place === 0 ? undefined : 'as before'}
            className="input-number"
            {...text(`prices.${place}.cells.${key}`, row.cells[key] ?? '', (typed) =>
              set({ prices: changed(prices, place, { cells: { ...row.cells, [key]: typed } }) }),
            )}
          />
        );
        return (
          <FormRow
            // biome-ignore lint/suspicious/noArrayIndexKey: a price row has no name but its place
            key={place}
            title={place === 0 ? 'First prices' : `Change ${place}`}
            onRemove={place === 0 ? null : () => set({ prices: without(prices, place) })}
          >
            <div className="grid items-end gap-x-6 sm:grid-cols-[repeat(auto-fit,minmax(190px,1fr))]">
              <Field
                label="From"
                type="date"
                {...text(`prices.${place}.from`, row.from, (from) => set({ prices: changed(prices, place, { from }) }))}
              />
              {single.map((item) => price(item, item.cells[0]?.key ?? '', itemLabel(item, form)))}
            </div>
            {several.map((item) => (
              <fieldset key={item.key} className="mt-5 min-w-0">
                <legend className="font-semibold">{item.label}</legend>
                {place === 0 && refusedOf(item) && <span className="field-error">{refusedOf(item)}</span>}
                <div
                  className={`grid items-end gap-x-6 ${item.cells.length % 3 === 0 ? 'sm:grid-cols-3' : 'sm:grid-cols-2'}`}
                >
                  {item.cells.map((cell) => price(item, cell.key, cell.label))}
                </div>
              </fieldset>
            ))}
          </FormRow>
        );
      })}
      <AddRow onClick={() => set({ prices: [...prices, { from: '', cells: {} }] })}>Add prices from a later day</AddRow>
    </Part>
  );
}

/** Where the plan keeps an item's prices: `charges.0.rates`. */
function ratesPath(form: PlanForm, key: string): string {
  const charge = form.charges.findIndex(({ id }) => id === key);
  const credit = form.credits.findIndex(({ id }) => id === key);
  return charge >= 0 ? `charges.${charge}.rates` : `credits.${credit}.rates`;
}

/** The only energy charge and the only credit are called by what they are; others by their names. */
function itemLabel(item: PricedItem, form: PlanForm): string {
  const energy = form.charges.filter(({ kind }) => kind === 'import');
  if (energy.length === 1 && energy[0]?.id === item.key) return 'A kWh bought';
  const exported = form.credits.filter(({ kind, basis }) => kind === 'export' && basis === 'export');
  if (exported.length === 1 && exported[0]?.id === item.key) return 'A kWh sent out';
  return item.label || 'Unnamed';
}
