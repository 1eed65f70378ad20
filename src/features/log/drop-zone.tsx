import { type ReactNode, useId, useRef, useState } from 'react';
import { Button } from '#src/ui/button.tsx';

/** Takes files by dropping them or by a button; both do the same. */
export function DropZone({
  title,
  hint,
  action,
  busy,
  onFiles,
  children,
}: {
  title: string;
  hint: ReactNode;
  action: string;
  busy: boolean;
  onFiles: (files: File[]) => void;
  children?: ReactNode;
}) {
  const input = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  const head = useId();
  return (
    <section
      aria-labelledby={head}
      className={`sheet border-dashed! ${over ? 'border-accent! outline-2 outline-accent' : ''}`}
      onDragOver={(event) => {
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={(event) => {
        event.preventDefault();
        setOver(false);
        onFiles([...event.dataTransfer.files]);
      }}
    >
      <h2 id={head}>{title}</h2>
      <p className="hint">{hint}</p>
      {children}
      <p className="mt-4 flex flex-wrap items-center gap-x-4 gap-y-2">
        <Button busy={busy} onClick={() => input.current?.click()}>
          {busy ? 'Reading' : action}
        </Button>
        <span className="hint hidden md:inline">or drop it here</span>
      </p>
      <input
        ref={input}
        type="file"
        multiple
        accept=".csv,.txt,text/csv,text/plain"
        className="hidden"
        aria-label={title}
        tabIndex={-1}
        onChange={(event) => {
          onFiles([...(event.target.files ?? [])]);
          // The same file can be chosen again after it was corrected.
          event.target.value = '';
        }}
      />
    </section>
  );
}
