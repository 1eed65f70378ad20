import { type ReactNode, useEffect } from 'react';

/** The large sentence that answers the screen's question, and the line under it. Sets the document's title from `title`. */
export function Sentence({ title, children, lede }: { title: string; children: ReactNode; lede?: ReactNode }) {
  useEffect(() => {
    document.title = `${title} · Gablebook`;
  }, [title]);
  return (
    <header>
      <h1>{children}</h1>
      {lede && <p className="lede">{lede}</p>}
    </header>
  );
}
