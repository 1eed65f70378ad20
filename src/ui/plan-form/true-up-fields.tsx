import { MONTH_NAMES } from '#shared/units/words.ts';
import { Field } from '../field.tsx';
import { Columns } from '../rows.tsx';
import { Tick, Ticks } from '../ticks.tsx';
import { toggled, usePlanEdit } from './edit.ts';
import type { BankForm, TrueUpForm } from './plan-form.ts';
import { ShareFields } from './share-fields.tsx';
import { TickList, WordSelect, YearlyDay } from './small-fields.tsx';

/** When unused credit lapses or is paid, what may stay, and what is kept back. */
export function TrueUpFields({
  trueUp,
  bank,
  path,
  put,
}: {
  trueUp: TrueUpForm;
  bank: BankForm;
  path: string;
  put: (changes: Partial<TrueUpForm>) => void;
}) {
  const { form, text, error } = usePlanEdit();
  const unit = bank.unit === 'kWh' ? 'kWh' : '$';
  const pays = trueUp.action === 'pay';
  const month = trueUp.months.length === 1 ? trueUp.months[0] : null;
  return (
    <>
      <Columns>
        <WordSelect
          label="It"
          value={trueUp.action}
          words={[
            ['expire', 'lapses'],
            ['pay', 'is paid to you'],
            ['donate', 'is given to a fund'],
          ]}
          onChange={(action) =>
            put({
              action,
              to: action === 'pay' ? trueUp.to || 'separate' : '',
              priced: action === 'pay' && bank.unit === 'kWh' && trueUp.priced === 'asItIs' ? 'own' : trueUp.priced,
            })
          }
        />
        <WordSelect
          label="When"
          value={trueUp.at === 'months' && trueUp.months.length !== 1 ? 'several' : trueUp.at}
          words={[
            ['months', 'once a year, with the bill of a month'],
            ['several', 'with the bills of several months'],
            ['date', 'on a day of the year'],
            ['everyCycle', 'with every bill'],
            ['finalBill', 'with the last bill, when you leave'],
          ]}
          onChange={(at) =>
            put(
              at === 'several'
                ? { at: 'months', months: trueUp.months.length > 1 ? trueUp.months : halfYearly(trueUp.months[0]) }
                : { at, ...(at === 'months' ? { months: trueUp.months.slice(0, 1) } : {}) },
            )
          }
        />
        {trueUp.at === 'months' && month !== null && month !== undefined && (
          <WordSelect
            label="With the bill that ends in"
            value={month}
            words={MONTH_NAMES.map((name, index) => [String(index + 1), name] as const)}
            onChange={(chosen) => put({ months: [chosen] })}
          />
        )}
        {trueUp.at === 'date' && <YearlyDay label="On" value={trueUp.date} onChange={(date) => put({ date })} />}
        {pays && (
          <WordSelect
            label="It is paid"
            error={error(`${path}.to`)}
            value={trueUp.to || 'separate'}
            words={[
              ['separate', 'by cheque, apart from the bill'],
              ['bill', 'on the bill'],
            ]}
            onChange={(to) => put({ to })}
          />
        )}
        {pays && bank.unit === 'kWh' && (
          <WordSelect
            label="Each kWh left is paid at"
            value={trueUp.priced}
            words={[
              ['own', 'a price of its own'],
              ['share', 'the retail price, or a share of it'],
            ]}
            onChange={(priced) => put({ priced })}
          />
        )}
      </Columns>
      {trueUp.at === 'months' && trueUp.months.length !== 1 && (
        <TickList
          legend="With the bills that end in"
          error={error(`${path}.months`)}
          options={MONTH_NAMES.map((label, index) => ({ value: String(index + 1), label }))}
          ticked={trueUp.months}
          onChange={(value, on) => put({ months: toggled(trueUp.months, value, on) })}
        />
      )}
      {pays && trueUp.priced === 'share' && <ShareFields part={trueUp} path={path} put={put} />}
      {pays && trueUp.priced === 'own' && (
        <Ticks>
          {form.seasons.length > 0 && (
            <Tick
              label="That price differs by season"
              checked={trueUp.bySeason}
              onChange={(bySeason) => put({ bySeason })}
            />
          )}
          {bank.byPeriod && (
            <Tick
              label="That price differs by time of day"
              checked={trueUp.byPeriod}
              onChange={(byPeriod) => put({ byPeriod })}
            />
          )}
        </Ticks>
      )}
      <Columns>
        <WordSelect
          label="What may be kept"
          error={error(`${path}.keep`)}
          value={trueUp.keep}
          words={[
            ['none', 'nothing'],
            ['amount', 'a fixed amount'],
            ['average', 'some months of average use'],
          ]}
          onChange={(keep) => put({ keep })}
        />
        {trueUp.keep === 'amount' && (
          <Field
            label="Kept at most"
            unit={unit}
            inputMode="decimal"
            {...text(`${path}.keepAmount`, trueUp.keepAmount, (keepAmount) => put({ keepAmount }))}
          />
        )}
        {trueUp.keep === 'average' && (
          <>
            <Field
              label="Months kept"
              inputMode="numeric"
              {...text(`${path}.keepCycles`, trueUp.keepCycles, (keepCycles) => put({ keepCycles }))}
            />
            <WordSelect
              label="Use is counted as"
              value={trueUp.keepUsage}
              words={[
                ['import', 'what you bought'],
                ['load', 'all the house used'],
                ['net', 'what you bought less what you sent out'],
              ]}
              onChange={(keepUsage) => put({ keepUsage })}
            />
          </>
        )}
        <Field
          label="Only when it is at least"
          unit={unit}
          inputMode="decimal"
          {...text(`${path}.atLeast`, trueUp.atLeast, (atLeast) => put({ atLeast }))}
        />
        {pays && (
          <Field
            label="Fee kept back"
            unit="$"
            inputMode="decimal"
            {...text(`${path}.fee`, trueUp.fee, (fee) => put({ fee }))}
          />
        )}
      </Columns>
    </>
  );
}

/** A month and the one half a year from it, as a sheet that settles twice a year has them. */
function halfYearly(month: string | undefined): string[] {
  const first = Number(month ?? '4');
  return [first, ((first + 5) % 12) + 1].sort((a, b) => a - b).map(String);
}
