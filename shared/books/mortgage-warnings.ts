import type { LoanFacts, MortgageFacts } from '../facts/finance.ts';
import { ON_TITLE, SECURITY_WORDS } from './mortgage-checklist.ts';

/** What can stand in the way of a removal: said, and never decided here. */
export type MortgageWarning = { id: 'security' | 'otherLien' | 'fha' | 'va'; words: string };

/**
 * Warnings by the kind of mortgage and by what else is secured on the home. A servicer may check for a subordinate lien and refuse on it (12 U.S.C.
 * 4902(a)); whether a fixture filing is one is for the servicer and counsel. FHA: from memory; VA: none.
 */
export function mortgageWarnings(mortgage: MortgageFacts, security: LoanFacts['security'] | null): MortgageWarning[] {
  const warnings: MortgageWarning[] = [];
  if (security !== null && ON_TITLE.includes(security)) {
    const said = SECURITY_WORDS[security];
    warnings.push({
      id: 'security',
      words: `${said.charAt(0).toUpperCase()}${said.slice(1)}. A servicer may take it for a subordinate lien and refuse the request; ask the servicer, and counsel on its rank.`,
    });
  }
  if (mortgage.otherLien === true) {
    warnings.push({
      id: 'otherLien',
      words:
        'Another lien on the home is stated. A servicer may refuse the request on it; ask before paying for an appraisal.',
    });
  }
  if (mortgage.kind === 'fha') {
    warnings.push({
      id: 'fha',
      words:
        'The law on cancelling mortgage insurance does not cover an FHA loan, and an appraisal does not take its insurance off. A refinance into a conventional loan does; ask a lender what it costs (from memory; ask the servicer).',
    });
  }
  if (mortgage.kind === 'va') {
    warnings.push({
      id: 'va',
      words: 'A VA loan carries no monthly mortgage insurance, so there is none to take off.',
    });
  }
  return warnings;
}
