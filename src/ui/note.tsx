import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';

/** A margin note: what, and a line about it. `bad` is something wrong; else something next. */
export function Note({
  title,
  bad,
  to,
  children,
}: {
  title: ReactNode;
  bad?: boolean;
  to?: string | null;
  children?: ReactNode;
}) {
  return (
    <div className={bad ? 'margin-note bad' : 'margin-note'}>
      <b>{to ? <Link to={to}>{title}</Link> : title}</b>
      {children && <span>{children}</span>}
    </div>
  );
}
