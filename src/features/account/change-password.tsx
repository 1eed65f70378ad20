import { zodResolver } from '@hookform/resolvers/zod';
import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { changePasswordBody, peopleApi } from '#shared/api/people.ts';
import { PASSWORD_MIN } from '#shared/api/session.ts';
import { call } from '#src/lib/api.ts';
import { showRefusal } from '#src/lib/form-faults.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary } from '#src/ui/field.tsx';
import { PasswordField } from '#src/ui/password-field.tsx';
import { Sheet } from '#src/ui/sheet.tsx';

const EMPTY = { current: '', next: '' };
const FIELD_OF = {
  'wrong-sign-in': { field: 'current', words: 'This is not your present password.' },
  'password-too-short': { field: 'next' },
  'password-too-common': { field: 'next' },
} as const;

/** Changes the signed-in person's password; every other session of theirs ends. `email` is for the browser's password keeper. */
export function ChangePassword({ email }: { email: string }) {
  const change = useMutation({
    mutationFn: (body: { current: string; next: string }) => call(peopleApi.changePassword, { body }),
  });
  const [refusals, setRefusals] = useState<string[]>([]);
  const { register, handleSubmit, formState, setError, reset } = useForm({
    resolver: zodResolver(changePasswordBody),
    mode: 'onTouched',
    defaultValues: EMPTY,
  });
  const submit = handleSubmit((body) => {
    setRefusals([]);
    change.mutate(body, {
      onSuccess: () => reset(EMPTY),
      onError: (error) => setRefusals(showRefusal(error, setError, (name) => name in EMPTY, FIELD_OF)),
    });
  });
  return (
    <Sheet title="Password" hint="Your other devices are signed out when you change it.">
      {change.isSuccess && (
        <p role="status" className="mark-ok">
          The password is changed.
        </p>
      )}
      <form onSubmit={submit} noValidate className="max-w-[420px]">
        <ErrorSummary title="The password was not changed" errors={refusals.map((text) => ({ text }))} />
        <input type="text" name="username" autoComplete="username" value={email} readOnly hidden />
        <PasswordField
          label="Present password"
          autoComplete="current-password"
          error={formState.errors.current?.message}
          {...register('current')}
        />
        <PasswordField
          label="New password"
          hint={`${PASSWORD_MIN} characters or more; common ones are refused.`}
          autoComplete="new-password"
          error={formState.errors.next?.message}
          {...register('next')}
        />
        <p className="mt-4">
          <Button type="submit" busy={change.isPending}>
            Change the password
          </Button>
        </p>
      </form>
    </Sheet>
  );
}
