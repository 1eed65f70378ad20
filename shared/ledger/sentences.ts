import type { Check } from '../reconcile/check.ts';
import { cents, parseDollars, ZERO_CENTS } from '../units/cents.ts';
import type { Cycle } from './cycle.ts';
import { sayMoney } from './say.ts';

/** A run of a sentence; `strong` is set in the heavy weight, `ahead` and `behind` in the colours of sign as well. */
export type SentencePart = { text: string; tone: 'plain' | 'strong' | 'ahead' | 'behind' };

type SentenceCycle = Pick<
  Cycle,
  'addedCents' | 'state' | 'provisional' | 'split' | 'whyNotSettled' | 'checks' | 'oursDueCents'
>;

/** The sentence under a cycle's dates: what it added, and how the bill stands against the meters. */
export function cycleSentence(cycle: SentenceCycle): SentencePart[] {
  const parts: SentencePart[] =
    cycle.addedCents >= 0
      ? [plain('Added '), { text: sayMoney(cycle.addedCents), tone: 'strong' }, plain(' to your position. ')]
      : [plain('Took '), { text: sayMoney(cents(-cycle.addedCents)), tone: 'strong' }, plain(' off your position. ')];
  return joined([...parts, ...billParts(cycle)]);
}

/** How the bill stands against the meters, alone: "The bill is $4.31 too high: it credits 44 kWh less than your meter saw leave." */
export function billSentence(cycle: SentenceCycle): string {
  return billParts(cycle)
    .map((part) => part.text)
    .join('');
}

function billParts(cycle: SentenceCycle): SentencePart[] {
  if (cycle.whyNotSettled !== null) return [plain(cycle.whyNotSettled)];
  // On a budget plan the charges and the amount due are two checks; the one that differs is told.
  const totals = cycle.checks.filter((check) => check.check === 'amountDue');
  const due = totals.find((check) => check.verdict === 'differs') ?? totals[0];
  const off = dueParts(cycle, due);
  switch (cycle.state) {
    case 'open':
      return [plain('A read is estimated, so the cycle is provisional until the next actual read.')];
    case 'balanced':
      return [
        plain(
          cycle.split
            ? 'Its figures are the cycle’s share of the first statement, by days: an estimate.'
            : 'The bill agrees with your meters.',
        ),
      ];
    case 'accepted':
      return off === null
        ? [plain('What differs is accepted with a note.')]
        : [...off, plain(', accepted with a note.')];
    case 'differs':
      return off === null ? [plain(otherDifferences(cycle.checks))] : [...off, ...causeParts(due?.cause ?? null)];
  }
}

function dueParts(cycle: SentenceCycle, due: Check | undefined): SentencePart[] | null {
  if (due?.verdict !== 'differs' || cycle.oursDueCents === null) return null;
  const difference = parseDollars(due.difference ?? '0') ?? ZERO_CENTS;
  return [
    plain('The bill is '),
    { text: sayMoney(cents(Math.abs(difference))), tone: 'strong' },
    plain(difference > 0 ? ' too high' : ' too low'),
  ];
}

/** A cause that begins with "It" is said of the bill and runs on; any other stands by itself. */
function causeParts(cause: string | null): SentencePart[] {
  if (cause === null) return [plain('.')];
  return cause.startsWith('It ') ? [plain(`: it ${cause.slice(3)}`)] : [plain(`. ${cause}`)];
}

function otherDifferences(checks: readonly Check[]): string {
  const open = checks.filter((check) => check.verdict === 'differs' && check.accepted === null);
  const [only] = open;
  if (open.length === 1 && only) return `The amount due agrees; one check differs. ${only.cause ?? only.title}`;
  return `The amount due agrees; ${open.length} checks differ: ${open.map((check) => check.title).join('; ')}.`;
}

function plain(text: string): SentencePart {
  return { text, tone: 'plain' };
}

function joined(parts: readonly SentencePart[]): SentencePart[] {
  const out: SentencePart[] = [];
  for (const part of parts) {
    const last = out.at(-1);
    if (last && last.tone === part.tone) out[out.length - 1] = { text: last.text + part.text, tone: part.tone };
    else out.push(part);
  }
  return out;
}
