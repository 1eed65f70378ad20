export function Brand() {
  return (
    <span className="flex items-center gap-2.5 text-xl font-bold tracking-[-0.01em]">
      <svg width="26" height="30" viewBox="0 0 26 30" fill="none" strokeWidth="2.2" aria-hidden="true">
        <path className="stroke-ink" d="M2 2h22v18H2zM16 2v18" />
        <path className="stroke-accent" d="M2 24.5h22M2 28.5h22" />
      </svg>
      Gablebook
    </span>
  );
}
