import { type ComponentProps, type ReactNode, useEffect, useId, useRef } from 'react';

type Shell = { label: ReactNode; hint?: ReactNode; error?: string | undefined };
/** What ties a control to its label, hint and error. */
type Tie = { id: string; 'aria-describedby': string | undefined; 'aria-invalid': true | undefined };

/** Label, hint and error around a control. */
function Labelled({ label, hint, error, children }: Shell & { children: (tie: Tie) => ReactNode }) {
  const id = useId();
  const described = [hint ? `${id}-hint` : null, error ? `${id}-error` : null].filter(Boolean).join(' ');
  return (
    <div className="field">
      <label htmlFor={id} className="field-label">
        {label}
      </label>
      {hint && (
        <span id={`${id}-hint`} className="field-hint">
          {hint}
        </span>
      )}
      {error && (
        <span id={`${id}-error`} className="field-error">
          {error}
        </span>
      )}
      {children({
        id,
        'aria-describedby': described === '' ? undefined : described,
        'aria-invalid': error ? true : undefined,
      })}
    </div>
  );
}

/** A labelled text input with hint and error; spread react-hook-form's `register(…)` into it. A unit stands after the input, `$` before. */
export function Field({
  label,
  hint,
  error,
  unit,
  className,
  ...input
}: ComponentProps<'input'> & Shell & { unit?: string }) {
  return (
    <Labelled label={label} hint={hint} error={error}>
      {(tie) => (
        <span className="flex items-center gap-2">
          {unit === '$' && <span className="hint">$</span>}
          <input {...input} {...tie} className={`input ${className ?? ''}`} />
          {unit && unit !== '$' && <span className="hint whitespace-nowrap">{unit}</span>}
        </span>
      )}
    </Labelled>
  );
}

export function SelectField({ label, hint, error, children, ...select }: ComponentProps<'select'> & Shell) {
  return (
    <Labelled label={label} hint={hint} error={error}>
      {(tie) => (
        <select {...select} {...tie} className="input">
          {children}
        </select>
      )}
    </Labelled>
  );
}

export function TextArea({ label, hint, error, ...area }: ComponentProps<'textarea'> & Shell) {
  return (
    <Labelled label={label} hint={hint} error={error}>
      {(tie) => <textarea {...area} {...tie} className="input" />}
    </Labelled>
  );
}

/** One question with a few answers. */
export function Choices({
  legend,
  hint,
  error,
  name,
  value,
  options,
  onChange,
}: {
  legend: ReactNode;
  hint?: ReactNode;
  error?: string | undefined;
  name: string;
  value: string | null;
  options: { value: string; label: ReactNode; hint?: ReactNode }[];
  onChange: (value: string) => void;
}) {
  return (
    <fieldset className="field">
      <legend className="field-label">{legend}</legend>
      {hint && <span className="field-hint">{hint}</span>}
      {error && <span className="field-error">{error}</span>}
      {options.map((option) => (
        <label key={option.value} className="flex min-h-11 items-start gap-3 py-2">
          <input
            type="radio"
            className="mt-1 size-5 shrink-0 accent-accent"
            name={name}
            value={option.value}
            checked={value === option.value}
            onChange={() => onChange(option.value)}
          />
          <span>
            {option.label}
            {option.hint && <span className="hint block">{option.hint}</span>}
          </span>
        </label>
      ))}
    </fieldset>
  );
}

/** What is wrong with a form, above it; takes the focus when it appears or changes. `pick` leads to the field. */
export function ErrorSummary({
  title = 'There is a problem',
  errors,
}: {
  title?: string;
  errors: { text: string; href?: string; pick?: () => void }[];
}) {
  const head = useRef<HTMLDivElement>(null);
  const said = errors.map((error) => error.text).join('\n');
  useEffect(() => {
    if (said !== '') head.current?.focus();
  }, [said]);
  if (errors.length === 0) return null;
  return (
    <div role="alert" tabIndex={-1} ref={head} className="margin-note bad mt-5">
      <b>{title}</b>
      <ul>
        {errors.map((error) => (
          <li key={error.text}>
            {error.href && <a href={error.href}>{error.text}</a>}
            {error.pick && (
              <button type="button" className="link text-left" onClick={error.pick}>
                {error.text}
              </button>
            )}
            {!error.href && !error.pick && error.text}
          </li>
        ))}
      </ul>
    </div>
  );
}
