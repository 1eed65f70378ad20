import type { CreditView } from '#shared/api/credit.ts';
import { MoneyFigure } from '#src/ui/figure.tsx';
import { Sheet } from '#src/ui/sheet.tsx';

/** By how much the roof raises the home's basis, with the credit used so far and with all of it. */
export function BasisSheet({ view }: { view: CreditView }) {
  const { basis } = view;
  if (view.credit === null) return null;
  return (
    <Sheet
      title="The home’s basis"
      hint="The roof adds its cost to what the home cost you for tax, less a subsidy that was not income, less the credit allowed (26 U.S.C. 25D(f))."
    >
      {basis === null ? (
        <p className="text-soft">
          {view.credit.carriedIn === null
            ? 'Nothing earns a credit yet, so there is nothing to take off.'
            : 'Earlier returns used a part of the credit that is not in this record, so the effect is not known here.'}
        </p>
      ) : (
        <dl className="mt-2 border-t-2 border-ink">
          <Row label="With the credit used on filed returns" figure={basis.soFar} />
          <Row label="With all of the credit" figure={basis.whole} />
        </dl>
      )}
      <p className="hint mt-2">
        Whether a credit carried forward lowers it as it is used or all at once was not found in the texts read: ask the
        preparer. A dealer fee and what was left out are not in it.
        {view.credit.homeShare !== '1' && ' A part in business use has a basis of its own.'}
      </p>
    </Sheet>
  );
}

function Row({ label, figure }: { label: string; figure: NonNullable<CreditView['basis']>['whole'] }) {
  return (
    <div className="flex items-baseline justify-between gap-x-5 border-b border-rule py-2">
      <dt>{label}</dt>
      <dd className="whitespace-nowrap">
        <MoneyFigure title={`The home’s basis: ${label}`} cents={figure.amountCents} working={figure.working} />
      </dd>
    </div>
  );
}
