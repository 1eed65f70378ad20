import type { Actor, Deps } from '../../deps.ts';
import { pdfPen } from '../../pdf/pdf-pen.ts';
import { summaryFacts } from './summary-facts.ts';
import { drawCreditSummary } from './summary-pages.ts';

/** The preparer's carryforward summary on two pages. The same facts on the same day give the same bytes. */
export async function creditSummaryPdf(
  deps: Pick<Deps, 'db' | 'clock'>,
  actor: Pick<Actor, 'householdId' | 'name'>,
): Promise<{ fileName: string; contentType: string; body: Uint8Array }> {
  const facts = summaryFacts(deps, actor);
  const { pen, end } = pdfPen({ title: `${facts.household}: tax credit summary`, madeOn: facts.madeOn });
  drawCreditSummary(pen, facts);
  return {
    fileName: `tax-credit-summary-${facts.madeOn}.pdf`,
    contentType: 'application/pdf',
    body: await end(),
  };
}
