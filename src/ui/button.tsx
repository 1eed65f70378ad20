import type { ComponentProps, ReactNode } from 'react';
import { Link } from 'react-router-dom';

type Look = 'main' | 'plain' | 'link';
const CLASSES: Record<Look, string> = { main: 'btn', plain: 'btn btn-plain', link: 'link' };

/** A button. `busy` keeps it from being pressed twice and says so to assistive technology. */
export function Button({
  look = 'main',
  busy = false,
  children,
  type = 'button',
  ...rest
}: ComponentProps<'button'> & { look?: Look; busy?: boolean }) {
  return (
    <button
      {...rest}
      type={type}
      className={CLASSES[look]}
      disabled={busy || rest.disabled}
      aria-busy={busy || undefined}
    >
      {children}
    </button>
  );
}

export function ButtonLink({ to, look = 'main', children }: { to: string; look?: Look; children: ReactNode }) {
  return (
    <Link to={to} className={CLASSES[look]}>
      {children}
    </Link>
  );
}
