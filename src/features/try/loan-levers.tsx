import type { ProjectionBasis } from '#shared/position/basis.ts';
import { money } from '#src/lib/format.ts';
import { Field } from '#src/ui/field.tsx';
import { Tick } from '#src/ui/ticks.tsx';
import { DayField } from './day-field.tsx';
import { Lever } from './lever.tsx';
import { dollarScale, percentScale, wholeScale } from './scales.ts';
import { SliderField } from './slider-field.tsx';
import type { Tryout } from './use-try.ts';

/** What can be done about the loan. `payoffCents` is what it takes to pay it off at the first month to come. */
export function LoanLevers({
  tryout,
  basis,
  payoffCents,
}: {
  tryout: Tryout;
  basis: ProjectionBasis;
  payoffCents: number;
}) {
  const { paydown, refinance } = tryout.draft.texts;
  const received = basis.close.creditReceivedCents;
  return (
    <>
      <Lever
        tryout={tryout}
        name="paydown"
        label="Pay extra into the loan"
        hint={received > 0 ? `Tax credit received so far: ${money(received)}.` : null}
      >
        <DayField tryout={tryout} lever="paydown" part="on" label="On" />
        <SliderField
          label="Amount"
          unit="$"
          value={paydown.amountCents}
          error={tryout.errorAt('paydown.amountCents')}
          scale={dollarScale(payoffCents, 50)}
          onText={(amountCents) => tryout.set('paydown', { amountCents })}
          onLeave={() => tryout.leave('paydown.amountCents')}
        />
        <Tick
          label="And have it re-amortized"
          hint="The payment falls and the last day stays. Without it the payment stays and the loan ends sooner. Ask the servicer whether it re-amortizes."
          checked={paydown.reamortize}
          onChange={(reamortize) => tryout.set('paydown', { reamortize })}
        />
      </Lever>
      <Lever tryout={tryout} name="refinance" label="Refinance the loan">
        <DayField tryout={tryout} lever="refinance" part="on" label="On" />
        <SliderField
          label="Yearly rate"
          unit="%"
          value={refinance.annualRate}
          error={tryout.errorAt('refinance.annualRate')}
          scale={percentScale(0, 15)}
          onText={(annualRate) => tryout.set('refinance', { annualRate })}
          onLeave={() => tryout.leave('refinance.annualRate')}
        />
        <SliderField
          label="Over"
          unit="months"
          value={refinance.termMonths}
          error={tryout.errorAt('refinance.termMonths')}
          scale={wholeScale(12, 360, 6)}
          onText={(termMonths) => tryout.set('refinance', { termMonths })}
          onLeave={() => tryout.leave('refinance.termMonths')}
        />
        <Field
          label="Costs, paid in cash"
          unit="$"
          inputMode="decimal"
          className="input-number max-w-[150px]"
          value={refinance.costsCents}
          error={tryout.errorAt('refinance.costsCents')}
          onChange={(event) => tryout.set('refinance', { costsCents: event.target.value })}
          onBlur={() => tryout.leave('refinance.costsCents')}
        />
      </Lever>
      <Lever
        tryout={tryout}
        name="cash"
        label="As if bought with cash"
        hint="No loan: its principal less the dealer’s fee is paid on the day it was funded."
      />
    </>
  );
}
