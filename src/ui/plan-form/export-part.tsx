import { Button } from '../button.tsx';
import { Choices } from '../field.tsx';
import { Fold } from '../fold.tsx';
import { FormRow, Part } from '../rows.tsx';
import { BankFields } from './bank-fields.tsx';
import { CreditFields } from './credit-fields.tsx';
import { usePlanEdit, without } from './edit.ts';
import { EXPORT_RULES, exportRuleOf, withExportRule } from './export-rule.ts';
import { Faults } from './faults.tsx';
import { freeId, newBank, newCredit, partIds } from './new-parts.ts';
import { WordSelect } from './small-fields.tsx';
import { useKeptAnswers } from './undo.ts';
import { NETTING_WORDS } from './words.ts';

/** What happens to what the roof sends out: one question, then its price and where the credit is kept. */
export function ExportPart({ faultsOf }: { faultsOf: (path: string) => string[] }) {
  const { form, set, name } = usePlanEdit();
  const rule = exportRuleOf(form);
  const answers = useKeptAnswers(form);
  const nettings = (Object.entries(NETTING_WORDS) as [typeof form.netting, string][]).filter(
    ([netting]) => netting !== 'period' || form.periods.length > 0 || form.netting === 'period',
  );
  const removeBank = (at: number) => {
    const gone = form.banks[at];
    set({
      banks: without(form.banks, at),
      credits: form.credits.map((credit) => (credit.to === gone?.id ? { ...credit, to: 'bill' } : credit)),
    });
  };
  const moveUp = (at: number) => {
    const banks = without(form.banks, at);
    banks.splice(at - 1, 0, ...form.banks.slice(at, at + 1));
    set({ banks });
  };
  return (
    <>
      <Part title="What you send out">
        <Choices
          legend="What happens when you send out more than you use?"
          name={name('exportRule')}
          value={rule}
          onChange={(value) => {
            const chosen = EXPORT_RULES.find((one) => one.value === value);
            if (chosen) set(answers.kept(chosen.value) ?? answers.keep(rule, withExportRule(form, chosen.value)));
          }}
          options={
            rule === 'other'
              ? [...EXPORT_RULES, { value: 'other', label: 'Something else', hint: 'As set out below.' }]
              : EXPORT_RULES
          }
        />
        {rule !== 'soldAll' && (
          <WordSelect
            label="What you send out is taken off what you buy"
            value={form.netting}
            words={nettings}
            onChange={(netting) => set({ netting })}
          />
        )}
        {form.credits.map((credit, at) => (
          <div key={credit.id}>
            <Fold
              title={credit.label || 'Unnamed credit'}
              summary={credit.kind === 'incentive' ? 'an incentive on the bill' : 'its price and where it goes'}
            >
              <CreditFields credit={credit} at={at} />
              <p className="mt-3">
                <button
                  type="button"
                  className="link hint min-h-11"
                  onClick={() => set({ credits: without(form.credits, at) })}
                >
                  Take out {credit.label || 'this credit'}
                </button>
              </p>
            </Fold>
            <Faults messages={faultsOf(`credits.${at}`)} />
          </div>
        ))}
        <p className="mt-4 flex flex-wrap gap-3">
          {rule !== 'nothing' && (
            <Button
              look="plain"
              onClick={() =>
                set({
                  credits: [
                    ...form.credits,
                    newCredit(
                      freeId(partIds(form), 'exportCredit'),
                      'Credit',
                      form.banks.find(({ unit }) => unit === 'USD')?.id ?? 'bill',
                    ),
                  ],
                })
              }
            >
              Add another credit
            </Button>
          )}
          <Button
            look="plain"
            onClick={() =>
              set({
                credits: [
                  ...form.credits,
                  newCredit(freeId(partIds(form), 'incentive'), 'Production incentive', 'bill', {
                    kind: 'incentive',
                    basis: 'production',
                  }),
                ],
              })
            }
          >
            Add an incentive paid on this bill
          </Button>
        </p>
      </Part>
      {(form.banks.length > 0 || form.credits.length > 0) && (
        <Part title="Unused credit" hint="The utility keeps it until it is used, paid or lapses.">
          {form.banks.map((bank, at) => {
            const body = (
              <>
                <Faults messages={faultsOf(`banks.${at}`)} />
                <BankFields bank={bank} at={at} />
                {at > 0 && (
                  <p className="mt-3">
                    <button type="button" className="link hint min-h-11" onClick={() => moveUp(at)}>
                      Use {bank.label || 'this credit'} before {form.banks[at - 1]?.label || 'the one above'}
                    </button>
                  </p>
                )}
              </>
            );
            return form.banks.length === 1 ? (
              <div key={bank.id}>{body}</div>
            ) : (
              <FormRow key={bank.id} title={bank.label || `Credit ${at + 1}`} onRemove={() => removeBank(at)}>
                {body}
              </FormRow>
            );
          })}
          <p className="mt-4">
            <Button
              look="plain"
              onClick={() =>
                set({
                  banks: [
                    ...form.banks,
                    newBank(
                      freeId(partIds(form), 'bank'),
                      form.banks.length === 0 ? 'Credit kept' : 'Second credit',
                      form.banks[0]?.unit ?? 'USD',
                    ),
                  ],
                })
              }
            >
              {form.banks.length === 0 ? 'Keep credit until it is paid' : 'Keep another credit apart'}
            </Button>
          </p>
        </Part>
      )}
    </>
  );
}
