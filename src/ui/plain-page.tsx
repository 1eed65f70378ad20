import type { ReactNode } from 'react';
import { Brand } from './brand.tsx';

/** A narrow page outside any household: the mark above, one column below. */
export function PlainPage({ aside, children }: { aside?: ReactNode; children: ReactNode }) {
  return (
    <>
      <header className="flex min-h-[73px] items-center justify-between gap-6 border-b border-rule px-[18px] py-3.5 lg:px-10">
        <Brand />
        <div className="text-[15px]">{aside}</div>
      </header>
      <main id="content" className="page max-w-[560px]">
        {children}
      </main>
    </>
  );
}
