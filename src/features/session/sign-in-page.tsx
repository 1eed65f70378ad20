import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Link, Navigate, useLocation } from 'react-router-dom';
import * as z from 'zod/mini';
import { ApiError } from '#src/lib/api.ts';
import { errorWords } from '#src/lib/problem-words.ts';
import { sessionQuery } from '#src/lib/session.ts';
import { Button } from '#src/ui/button.tsx';
import { ErrorSummary, Field } from '#src/ui/field.tsx';
import { PasswordField } from '#src/ui/password-field.tsx';
import { PlainPage } from '#src/ui/plain-page.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { useSignIn } from './session-queries.ts';

const signInForm = z.object({
  email: z.string().check(z.trim(), z.minLength(1, { error: 'Write your e-mail address.' })),
  password: z.string().check(z.minLength(1, { error: 'Write your password.' })),
});

export function SignInPage() {
  const session = useQuery(sessionQuery);
  const back = useWayBack();
  const signIn = useSignIn();
  const [refusal, setRefusal] = useState<string | null>(null);
  const { register, handleSubmit, formState, setFocus, resetField } = useForm({
    resolver: zodResolver(signInForm),
    mode: 'onTouched',
    defaultValues: { email: '', password: '' },
  });
  if (session.data) return <Navigate to={back} replace />;
  const submit = handleSubmit((typed) => {
    setRefusal(null);
    signIn.mutate(typed, {
      onError: (error) => {
        const wrong = error instanceof ApiError && error.problem.code === 'wrong-sign-in';
        setRefusal(
          wrong ? 'That e-mail and password do not go together. Check both and try again.' : errorWords(error),
        );
        if (wrong) {
          resetField('password', { keepTouched: false });
          setFocus('password');
        }
      },
    });
  });
  return (
    <PlainPage aside={<Link to="/sign-up">Start a book</Link>}>
      <Sentence title="Sign in" lede="An account book for a home with a financed solar roof.">
        <b>Sign in</b> to your book.
      </Sentence>
      <form onSubmit={submit} noValidate className="mt-6">
        {refusal && <ErrorSummary title="You are not signed in" errors={[{ text: refusal }]} />}
        <Field
          label="E-mail"
          type="email"
          inputMode="email"
          autoComplete="username"
          error={formState.errors.email?.message}
          {...register('email')}
        />
        <PasswordField
          autoComplete="current-password"
          error={formState.errors.password?.message}
          {...register('password')}
        />
        <p className="mt-4">
          <Button type="submit" busy={signIn.isPending}>
            {signIn.isPending ? 'Signing in' : 'Sign in'}
          </Button>
        </p>
      </form>
      <p className="hint mt-8">
        New here?{' '}
        <Link className="link" to="/sign-up">
          Start a book for your house
        </Link>
        . If somebody keeps the book already, ask them to add you.
      </p>
    </PlainPage>
  );
}

/** Where the person was going when sign-in came between; only places inside this application. */
function useWayBack(): string {
  const state: unknown = useLocation().state;
  const from = typeof state === 'object' && state !== null && 'from' in state ? state.from : null;
  return typeof from === 'string' && /^\/(?!\/)/.test(from) ? from : '/';
}
