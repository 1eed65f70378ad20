import type { ReactNode } from 'react';
import { errorWords } from '#src/lib/problem-words.ts';
import { Button } from './button.tsx';

/** The shape of a page while it loads: a sentence and two sheets. */
export function PageSkeleton() {
  return (
    <div className="page" aria-busy="true">
      <p className="visually-hidden">Loading</p>
      <div className="bone h-11 w-3/5" />
      <div className="bone mt-4 h-5 w-2/5" />
      <div className="sheet">
        <div className="bone h-64" />
      </div>
      <div className="sheet">
        <div className="bone h-32" />
      </div>
    </div>
  );
}

/** What happened, what is safe, what to do. */
export function ErrorState({ error, retry }: { error: unknown; retry?: () => void }) {
  return (
    <div className="page page-narrow">
      <h1>This page could not be shown.</h1>
      <p className="lede">{errorWords(error)}</p>
      <p className="mt-4">What you have posted is kept on the server and is not touched by this.</p>
      {retry && (
        <p className="mt-5">
          <Button onClick={retry}>Try again</Button>
        </p>
      )}
    </div>
  );
}

/** First use of a screen: what this is and what to do. */
export function EmptyState({ title, children, action }: { title: ReactNode; children: ReactNode; action?: ReactNode }) {
  return (
    <section className="sheet">
      <h2>{title}</h2>
      <div className="mt-2 max-w-[60ch]">{children}</div>
      {action && <div className="mt-5 flex flex-wrap gap-3">{action}</div>}
    </section>
  );
}
