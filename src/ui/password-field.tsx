import { type ComponentProps, type ReactNode, useState } from 'react';
import { Field } from './field.tsx';

/** A password input that can be shown while it is typed. Pasting is allowed; the browser's own keeper is told what it is. */
export function PasswordField({
  label = 'Password',
  ...rest
}: Omit<ComponentProps<'input'>, 'type'> & { label?: string; hint?: ReactNode; error?: string | undefined }) {
  const [shown, setShown] = useState(false);
  return (
    <div>
      <Field
        {...rest}
        label={label}
        type={shown ? 'text' : 'password'}
        spellCheck={false}
        autoCapitalize="off"
        autoCorrect="off"
      />
      <button
        type="button"
        className="link hint min-h-11"
        aria-pressed={shown}
        onClick={() => setShown((before) => !before)}
      >
        {shown ? 'Hide what I type' : 'Show what I type'}
      </button>
    </div>
  );
}
