import { Choices } from '#src/ui/field.tsx';
import { Tick, Ticks } from '#src/ui/ticks.tsx';
import type { PlanForm } from './plan-form.ts';

/** What a percent tax is on, and whether before or after credits. */
export function TaxQuestions({
  answers,
  set,
  error,
  at,
}: {
  answers: PlanForm;
  set: <N extends keyof PlanForm>(name: N, value: PlanForm[N]) => void;
  error: string | undefined;
  at: string;
}) {
  return (
    <>
      <fieldset className="field">
        <legend className="field-label">It is on</legend>
        {error && <span className="field-error">{error}</span>}
        <Ticks>
          <Tick label="energy" checked={answers.taxOnEnergy} onChange={(on) => set('taxOnEnergy', on)} />
          {answers.hasCustomer && (
            <Tick
              label="the customer charge"
              checked={answers.taxOnCustomer}
              onChange={(on) => set('taxOnCustomer', on)}
            />
          )}
          {answers.hasGross && (
            <Tick
              label={answers.labels.gross || 'the charge on every kWh bought'}
              checked={answers.taxOnGross}
              onChange={(on) => set('taxOnGross', on)}
            />
          )}
        </Ticks>
      </fieldset>
      <Choices
        legend="The tax is worked out"
        name={`${at}.taxAfterCredits`}
        value={answers.taxAfterCredits ? 'after' : 'before'}
        onChange={(value) => set('taxAfterCredits', value === 'after')}
        options={[
          { value: 'after', label: 'on what credits leave to pay' },
          { value: 'before', label: 'on the charges before credits' },
        ]}
      />
    </>
  );
}
