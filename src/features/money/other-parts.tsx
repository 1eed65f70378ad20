import { useQuery } from '@tanstack/react-query';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from '#src/ui/button.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { CostsSheet } from './costs-sheet.tsx';
import { otherMoneyQuery } from './other-queries.ts';
import { OtherSheet } from './other-sheet.tsx';
import { PaperSheet } from './paper-sheet.tsx';

/** What stands under the loan, the insurance and the incentive on Money: other money, costs and the papers behind it all. */
export function OtherParts(given: { householdId: string; canEdit: boolean; today: string }) {
  const view = useQuery(otherMoneyQuery(given.householdId));
  return (
    <>
      {view.isPending && (
        <Sheet>
          <div className="bone h-40" aria-busy="true" />
        </Sheet>
      )}
      {view.isError && (
        <Sheet title="Costs and other money could not be shown">
          <p role="alert">{errorWords(view.error)}</p>
          <p className="mt-3">
            <Button look="plain" onClick={() => view.refetch()}>
              Try again
            </Button>
          </p>
        </Sheet>
      )}
      {view.isSuccess && (
        <>
          <CostsSheet view={view.data.costs} {...given} />
          <OtherSheet view={view.data} {...given} />
        </>
      )}
      <PaperSheet householdId={given.householdId} canEdit={given.canEdit} />
    </>
  );
}
