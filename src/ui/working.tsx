import { createContext, lazy, type ReactNode, Suspense, useContext, useEffect, useRef, useState } from 'react';
import type { Working } from '#shared/working.ts';
import type { ShownWorking } from './working-body.tsx';

const loadBody = () => import('./working-body.tsx');
const WorkingBody = lazy(async () => ({ default: (await loadBody()).WorkingBody }));
const ShowWorking = createContext<(shown: ShownWorking) => void>(() => {});

/** Holds the one panel in which any figure shows its working: a dialog on a desk, a sheet on a phone. */
export function WorkingProvider({ children }: { children: ReactNode }) {
  const [shown, setShown] = useState<ShownWorking | null>(null);
  const dialog = useRef<HTMLDialogElement>(null);
  // The first page needs no working; it is here by the time a figure is pressed.
  useEffect(() => {
    void loadBody().catch(() => {});
  }, []);
  useEffect(() => {
    if (shown) dialog.current?.showModal();
  }, [shown]);
  return (
    <ShowWorking value={setShown}>
      {children}
      {/* biome-ignore lint/a11y/useKeyWithClickEvents: a click on the backdrop closes as Escape does, which the dialog handles itself */}
      <dialog
        ref={dialog}
        className="panel"
        aria-labelledby="working-title"
        onClose={() => setShown(null)}
        onClick={(event) => {
          if (event.target === dialog.current) dialog.current?.close();
        }}
      >
        {shown && (
          <Suspense fallback={<div className="bone h-40" aria-busy="true" />}>
            <WorkingBody shown={shown} close={() => dialog.current?.close()} />
          </Suspense>
        )}
      </dialog>
    </ShowWorking>
  );
}

/** A figure that opens its working. `title` names it ("Electricity bill avoided, this cycle"), `text` is the figure as shown. */
export function FigureButton({
  title,
  text,
  working,
  className,
}: {
  title: string;
  text: string;
  working: Working;
  className?: string | undefined;
}) {
  const show = useContext(ShowWorking);
  return (
    <button
      type="button"
      className={`figure ${className ?? ''}`}
      aria-haspopup="dialog"
      title="Show the working"
      onClick={() => show({ title, figure: text, working })}
    >
      {text}
    </button>
  );
}
