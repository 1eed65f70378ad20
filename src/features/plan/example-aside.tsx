import type { ExampleView } from '#shared/api/plan.ts';
import type { Settlement } from '#shared/settlement/settlement.ts';
import { cycleRange, decimal, fullDate, kwh, money } from '#src/lib/format.ts';
import { SelectField } from '#src/ui/field.tsx';
import { Money } from '#src/ui/money.tsx';
import { FigureButton } from '#src/ui/working.tsx';

/** A month worked as the plan is being written: its lines, its credit and what is due, or what is wrong in words. */
export function ExampleAside({
  view,
  missing,
  busy,
  to,
  choose,
  periods,
}: {
  view: ExampleView | null;
  /** How many fields are still empty or do not read. */
  missing: number;
  busy: boolean;
  to: string | null;
  choose: (to: string) => void;
  periods: ReadonlyMap<string, string>;
}) {
  return (
    <aside aria-label="An example month" className="min-w-0 lg:sticky lg:top-4 lg:self-start">
      <h2>An example month</h2>
      {view && view.cycles.length > 0 && (
        <SelectField
          label="Worked on your cycle"
          value={to ?? view.cycles[0]?.to ?? ''}
          onChange={(event) => choose(event.target.value)}
        >
          {view.cycles.map((cycle) => (
            <option key={cycle.to} value={cycle.to}>
              {cycleRange(cycle.from, cycle.to)}
            </option>
          ))}
        </SelectField>
      )}
      {missing > 0 ? (
        <p className="hint mt-3">
          {missing === 1 ? 'One field is' : `${missing} fields are`} still to be filled in. Then the month is worked out
          here.
        </p>
      ) : (
        view && (
          <div aria-live="polite" aria-busy={busy} className={busy ? 'opacity-60' : undefined}>
            <UsageWords view={view} />
            {view.faults.map((fault) => (
              <p key={fault.message} className="field-error mt-3">
                {fault.message}
              </p>
            ))}
            {view.settlement && <Lines settlement={view.settlement} periods={periods} />}
          </div>
        )
      )}
    </aside>
  );
}

function UsageWords({ view }: { view: ExampleView }) {
  const { usage } = view;
  const made = usage.productionWh === null ? '' : `, ${kwh(usage.productionWh)} made`;
  return (
    <p className="hint mt-3">
      {kwh(usage.importWh)} kWh bought, {kwh(usage.exportWh)} sent out{made}.{' '}
      {usage.source === 'invented' && 'A made-up month: your own is used once one is logged. '}
      {usage.sharedEvenly && 'No readings say when, so the kWh are shared evenly over the periods. '}
      {view.pricesTakenBack && `The first prices are used as if they held on ${fullDate(usage.from)}. `}
      Credit begins at nothing.
    </p>
  );
}

function Lines({ settlement, periods }: { settlement: Settlement; periods: ReadonlyMap<string, string> }) {
  const part = (period: string | null, tier: number | null) =>
    [period === null ? null : (periods.get(period) ?? period), tier === null ? null : `tier ${tier}`].filter(
      (word) => word !== null,
    );
  return (
    <>
      <table className="ruled ruled-tight mt-3">
        <caption className="visually-hidden">The example month, line by line</caption>
        <thead>
          <tr>
            <th scope="col">Line</th>
            <th scope="col">Amount</th>
          </tr>
        </thead>
        <tbody>
          {settlement.lines.map((line) => {
            const label = [line.label, ...part(line.period, line.tier)].join(', ');
            return (
              <tr key={[line.component, line.kind, line.period, line.tier, line.from].join(' ')}>
                <th scope="row">
                  {label}
                  {line.quantity !== null && line.rate !== null && line.unit !== null && (
                    <span className="hint block">{rateWords(line.quantity, line.unit, line.rate)}</span>
                  )}
                  {!line.inDue && <span className="hint block">to the credit, not on this bill</span>}
                </th>
                <td>
                  <FigureButton
                    title={`${label}, example`}
                    text={money(line.amountCents)}
                    working={line.working}
                    className={line.amountCents < 0 ? 'neg' : undefined}
                  />
                </td>
              </tr>
            );
          })}
          <tr className="total">
            <th scope="row">Due</th>
            <td>
              <Money cents={settlement.amountDueCents} />
            </td>
          </tr>
        </tbody>
      </table>
      {settlement.banks.map((bank) => (
        <p key={`${bank.bank} ${bank.period}`} className="mt-3">
          <b>{[bank.label, ...part(bank.period, null)].join(', ')}</b>{' '}
          <span className="hint">
            earned {amount(bank.move.earned, bank.unit)}, used {amount(bank.move.used, bank.unit)}, holds{' '}
            {amount(bank.move.close, bank.unit)}
          </span>
        </p>
      ))}
      {settlement.payouts.map((payout) => (
        <p key={payout.component} className="mt-3">
          <b>{payout.label}</b> <span className="hint">paid apart: {money(payout.amountCents)}</span>
        </p>
      ))}
    </>
  );
}

function rateWords(quantity: string, unit: string, rate: string): string {
  const shown = decimal(rate);
  if (unit === 'USD') return `${shown} of ${amount(quantity, 'USD')}`;
  return `${decimal(quantity)} ${unit === 'cycle' ? 'bill' : unit === 'day' ? 'days' : unit} × $${shown}`;
}

function amount(text: string, unit: 'kWh' | 'USD'): string {
  const shown = decimal(text);
  if (unit === 'kWh') return `${shown} kWh`;
  return shown.startsWith('\u2212') ? `\u2212$${shown.slice(1)}` : `$${shown}`;
}
