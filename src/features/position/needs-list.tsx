import type { PositionView } from '#shared/api/position.ts';
import { Note } from '#src/ui/note.tsx';

const STEP_NAMES: Record<string, string> = {
  house: 'the house',
  roof: 'the roof',
  plan: 'the rate plan',
  before: 'use before the roof',
  loan: 'the loan',
  mortgage: 'the mortgage',
  credit: 'the tax credit',
  incentive: 'the incentive',
  cash: 'cash and upkeep',
};

/** "Needs you": what is wrong first, then what is next, then what would make the figures more complete. */
export function NeedsList({
  needs,
  unfinished,
  base,
}: {
  needs: PositionView['needs'];
  /** Steps of the set-up left for later; named only where no need speaks of the set-up already. */
  unfinished: PositionView['unfinishedSteps'];
  base: string;
}) {
  const steps = needs.some((need) => need.key === 'set-up') ? [] : unfinished;
  return (
    <section aria-labelledby="needs-you">
      <h2 id="needs-you" className="mb-3.5">
        Needs you
      </h2>
      <NeedNotes needs={[...needs].sort((a, b) => Number(b.tone === 'bad') - Number(a.tone === 'bad'))} base={base} />
      {steps.length > 0 && (
        <Note title="Set-up is not finished" to={`${base}/setup/${steps[0]}`}>
          Left out of the figures so far: {listed(steps.map((step) => STEP_NAMES[step] ?? step))}.
        </Note>
      )}
      {needs.length === 0 && steps.length === 0 && <p className="hint">Nothing needs you now.</p>}
    </section>
  );
}

export function NeedNotes({ needs, base }: { needs: PositionView['needs']; base: string }) {
  return needs.map((need) => (
    <Note key={need.key} title={need.title} bad={need.tone === 'bad'} to={need.link ? `${base}/${need.link}` : null}>
      {need.detail}
    </Note>
  ));
}

function listed(words: string[]): string {
  if (words.length < 2) return words.join('');
  return `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`;
}
