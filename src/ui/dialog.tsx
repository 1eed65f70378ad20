import { type ReactNode, useEffect, useId, useRef } from 'react';

/** A modal dialog while it is rendered: a panel on a desk, a sheet from below on a phone. Escape, the backdrop and Close all close it. */
export function Dialog({ title, onClose, children }: { title: ReactNode; onClose: () => void; children: ReactNode }) {
  const dialog = useRef<HTMLDialogElement>(null);
  const id = useId();
  useEffect(() => {
    const element = dialog.current;
    if (element && !element.open) element.showModal();
  }, []);
  return (
    // biome-ignore lint/a11y/useKeyWithClickEvents: a click on the backdrop closes as Escape does, which the dialog handles itself
    <dialog
      ref={dialog}
      className="panel"
      aria-labelledby={id}
      onClose={onClose}
      onClick={(event) => {
        if (event.target === dialog.current) dialog.current?.close();
      }}
    >
      <div className="flex items-baseline justify-between gap-6">
        <h2 id={id}>{title}</h2>
        <button type="button" className="link min-h-11" onClick={() => dialog.current?.close()}>
          Close
        </button>
      </div>
      {children}
    </dialog>
  );
}
