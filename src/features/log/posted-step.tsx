import type { PostedView } from '#shared/api/log.ts';
import type { Entry } from '#shared/books/book.ts';
import { type IntervalChannel, intervalChannel } from '#shared/facts/papers.ts';
import { type Cents, cents } from '#shared/units/cents.ts';
import { cycleRange, dayMonth, money, monthName } from '#src/lib/format.ts';
import { useHousehold } from '#src/lib/household.ts';
import { BOOK_NAMES, BookKey } from '#src/ui/book-key.tsx';
import { ButtonLink } from '#src/ui/button.tsx';
import { Money } from '#src/ui/money.tsx';
import { Note } from '#src/ui/note.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { Sheet } from '#src/ui/sheet.tsx';
import { FigureButton } from '#src/ui/working.tsx';
import { countOf } from './counts.ts';

type PostedCycle = PostedView['cycles'][number];

/** What the posting added: a sentence, the lines it is made of, and what it did to the position. */
export function PostedStep({ posted }: { posted: PostedView }) {
  const { id } = useHousehold();
  const last = posted.cycles.at(-1);
  const added = cents(posted.cycles.reduce((sum, cycle) => sum + cycle.addedCents, 0));
  const rise = cents(posted.settledAfterCents - posted.settledBeforeCents);
  return (
    <>
      <Sentence title="Posted" lede={readingsWords(posted)}>
        <PostedSentence posted={posted} />
      </Sentence>
      <div className="grid gap-x-[26px] lg:grid-cols-[minmax(0,1fr)_330px]">
        <div className="min-w-0">
          {posted.cycles.map((cycle) => (
            <CycleSheet key={cycle.to} cycle={cycle} />
          ))}
          <Sheet
            title="What it did to the position"
            hint="Everything the house has stated and posted, before and after this posting."
          >
            <table className="ruled">
              <thead>
                <tr>
                  <th scope="col">
                    <span className="visually-hidden">Figure</span>
                  </th>
                  <th scope="col">Before</th>
                  <th scope="col">After</th>
                </tr>
              </thead>
              <tbody>
                <tr>
                  <th scope="row">Cash so far</th>
                  <td>
                    <Money cents={posted.cashBeforeCents} />
                  </td>
                  <td>
                    <Money cents={posted.cashAfterCents} />
                  </td>
                </tr>
                <tr className="total">
                  <th scope="row">Settled today</th>
                  <td>
                    <Money cents={posted.settledBeforeCents} />
                  </td>
                  <td>
                    <Money cents={posted.settledAfterCents} />
                  </td>
                </tr>
              </tbody>
            </table>
            <p className="mt-3">
              Settled today {rise < 0 ? 'fell' : 'rose'} by <b>{money(cents(Math.abs(rise)))}</b>.
              {rise !== added && (
                <span className="hint block">
                  Payments and premiums stand in the position from their own day on, with or without a statement; what
                  the loan still owes and what is owed to you moves with it too.
                </span>
              )}
            </p>
          </Sheet>
        </div>
        <aside className="mt-[26px] lg:pt-[22px]">
          <h2 className="mb-4">Next</h2>
          {posted.cycles.flatMap((cycle) =>
            cycle.differs.map((differs) => (
              <Note
                key={`${cycle.to} ${differs}`}
                bad
                title={`${monthName(cycle.to)}: ${differs.split(': ')[0] ?? differs}`}
                to={`/h/${id}/cycles/${cycle.to}`}
              >
                {differs.split(': ').slice(1).join(': ')}
              </Note>
            )),
          )}
          {posted.cycles.every((cycle) => cycle.differs.length === 0) && posted.cycles.length > 0 && (
            <Note title="Nothing differs">Every check that could be made agrees.</Note>
          )}
          <p className="mt-5 flex flex-wrap gap-3">
            {last && <ButtonLink to={`/h/${id}/cycles/${last.to}`}>{`${monthName(last.to)}’s cycle`}</ButtonLink>}
            <ButtonLink to={`/h/${id}`} look={last ? 'plain' : 'main'}>
              Position
            </ButtonLink>
            <ButtonLink to={`/h/${id}/log`} look="link">
              Log more
            </ButtonLink>
          </p>
        </aside>
      </div>
    </>
  );
}

function PostedSentence({ posted }: { posted: PostedView }) {
  const [only] = posted.cycles;
  if (!only) {
    return (
      <>
        <b>The readings</b> are in the book.
      </>
    );
  }
  const added = cents(posted.cycles.reduce((sum, cycle) => sum + cycle.addedCents, 0));
  const name = posted.cycles.length === 1 ? monthName(only.to) : `${posted.cycles.length} cycles`;
  return added < 0 ? (
    <>
      {name} took <b className="neg">{money(cents(-added))}</b> from your position.
    </>
  ) : (
    <>
      {name} added <b className="pos">{money(added)}</b> to your position.
    </>
  );
}

function CycleSheet({ cycle }: { cycle: PostedCycle }) {
  const summed = cycle.entries.filter((entry) => entry.basis !== 'memo');
  const memo = cycle.entries.filter((entry) => entry.basis === 'memo');
  return (
    <Sheet title={cycleRange(cycle.from, cycle.to)} hint="Open any figure to see how it comes about.">
      <table className="ruled">
        <thead>
          <tr>
            <th scope="col">Entry</th>
            <th scope="col">Day</th>
            <th scope="col">Amount</th>
          </tr>
        </thead>
        <tbody>
          {summed.map((entry) => (
            <EntryRow key={entry.id} entry={entry} />
          ))}
          {summed.length === 0 && (
            <tr>
              <th scope="row" colSpan={3}>
                No money is entered for this cycle yet. Finish the set-up to see what it added.
              </th>
            </tr>
          )}
          <tr className="total">
            <th scope="row">Added by this cycle</th>
            <td />
            <td>
              <Money cents={cycle.addedCents} />
            </td>
          </tr>
          {memo.map((entry) => (
            <EntryRow key={entry.id} entry={entry} memo />
          ))}
        </tbody>
      </table>
      <p className="hint mt-3">{billWords(cycle.billedDueCents, cycle.oursDueCents)}</p>
    </Sheet>
  );
}

function EntryRow({ entry, memo = false }: { entry: Entry; memo?: boolean }) {
  return (
    <tr>
      <th scope="row" className={memo ? 'text-soft!' : ''}>
        <BookKey book={entry.book} />
        {entry.label || BOOK_NAMES[entry.book]}
        {entry.estimated && <span className="hint"> estimated</span>}
        {memo && <span className="hint"> shown, not counted</span>}
      </th>
      <td className="text-soft whitespace-nowrap">{dayMonth(entry.date)}</td>
      <td>
        <FigureButton
          title={entry.label || BOOK_NAMES[entry.book]}
          text={money(entry.amountCents)}
          working={entry.working}
          className={memo ? 'text-soft' : entry.amountCents < 0 ? 'neg' : undefined}
        />
      </td>
    </tr>
  );
}

function billWords(billed: Cents, ours: Cents | null): string {
  if (ours === null) return `Billed ${money(billed)}. It cannot be worked out again yet; the cycle’s page says why.`;
  return billed === ours
    ? `Billed ${money(billed)}; worked out again it comes to the same.`
    : `Billed ${money(billed)}; worked out again it comes to ${money(ours)}.`;
}

const READINGS: Record<IntervalChannel, string> = {
  production: 'from the production meter',
  monitor: 'from the inverter’s monitoring',
  import: 'of what was bought',
  export: 'of what was sent out',
};

function readingsWords(posted: PostedView): string | null {
  const parts = intervalChannel.options.flatMap((channel) => {
    const days = posted.readingsDays[channel] ?? 0;
    return days > 0 ? [`${countOf(days, 'day')} ${READINGS[channel]}`] : [];
  });
  return parts.length === 0 ? null : `With readings for ${parts.join(' and ')}.`;
}
