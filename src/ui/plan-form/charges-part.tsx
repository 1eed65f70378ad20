import { Button } from '../button.tsx';
import { Fold } from '../fold.tsx';
import { Part } from '../rows.tsx';
import { Tick, Ticks } from '../ticks.tsx';
import { COMMON, commonCharge, likeEnergy, withCharge, withoutCharge } from './change-charges.ts';
import { ChargeFields } from './charge-fields.tsx';
import { usePlanEdit } from './edit.ts';
import { Faults } from './faults.tsx';
import { freeId, newCharge, partIds } from './new-parts.ts';
import type { ChargeForm } from './plan-form.ts';
import { useKeptAnswers } from './undo.ts';
import { chargeWords } from './words.ts';

/** The charges of the sheet: common ones by a tick, each with its own questions. */
export function ChargesPart({ faultsOf }: { faultsOf: (path: string) => string[] }) {
  const { form, set } = usePlanEdit();
  const answers = useKeptAnswers(form);
  const add = (charge: ChargeForm) => set({ charges: withCharge(form, charge) });
  return (
    <Part
      title="What is on the bill"
      hint="Every charge of the sheet, in its order. Open one for its name and how it is counted."
    >
      <Ticks>
        {COMMON.map(({ kind, label, hint, is }) => {
          const held = form.charges.filter(is);
          return (
            <Tick
              key={kind}
              label={label}
              {...(hint ? { hint } : {})}
              checked={held.length > 0}
              onChange={(on) =>
                set(
                  on
                    ? (answers.kept(kind) ?? { charges: withCharge(form, commonCharge(kind, form)) })
                    : answers.keep(
                        kind,
                        held.reduce((rest, { id }) => withoutCharge(rest, id), form),
                      ),
                )
              }
            />
          );
        })}
      </Ticks>
      <div className="mt-4">
        {form.charges.map((charge, at) => (
          <div key={charge.id}>
            <Fold title={charge.label || 'Unnamed charge'} summary={chargeWords(charge)}>
              <ChargeFields charge={charge} at={at} />
            </Fold>
            <Faults messages={faultsOf(`charges.${at}`)} />
          </div>
        ))}
      </div>
      <p className="mt-4 flex flex-wrap gap-3">
        <Button
          look="plain"
          onClick={() =>
            add(newCharge(freeId(partIds(form), 'energy'), 'Delivery', 'import', 'import', likeEnergy(form)))
          }
        >
          Add another price on each kWh
        </Button>
        <Button
          look="plain"
          onClick={() =>
            add(
              newCharge(freeId(partIds(form), 'tax'), 'Fee', 'tax', 'percent', {
                on: form.charges.map(({ id }) => id),
                afterCredits: true,
              }),
            )
          }
        >
          Add another percentage
        </Button>
        <Button
          look="plain"
          onClick={() =>
            add(newCharge(freeId(partIds(form), 'charge'), 'Rider', 'adjustment', 'import', { netting: 'none' }))
          }
        >
          Add another charge
        </Button>
      </p>
    </Part>
  );
}
