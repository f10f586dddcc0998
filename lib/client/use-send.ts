'use client';

import { useState } from 'react';
import type { z } from 'zod';
import { ClientError } from './fetcher';
import { focusFirstError } from './focus';
import { sentencesOf } from '../contracts/issues';

/** First sentence of what is wrong, by the contract's own path: `parts.0.volume_l`. */
export type PathErrors = Readonly<Record<string, string>>;

const firstOf = (fields: Record<string, readonly string[]>): Record<string, string> => Object.fromEntries(Object.entries(fields).flatMap(([path, said]) => (said[0] ? [[path, said[0]]] : [])));

/**
 * Sends what a schema has checked. What is wrong stands at its path; what no field
 * shows is told once for the whole form.
 * @param shows whether a field of the form shows what is wrong at a path
 */
export function useSend<S extends z.ZodType, A>(schema: S, send: (form: z.output<S>) => Promise<A>, shows: (path: string) => boolean) {
  const [errors, setErrors] = useState<PathErrors>({});
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const [answer, setAnswer] = useState<A | null>(null);

  function tell(fields: Record<string, readonly string[]>) {
    const found = firstOf(fields);
    setErrors(found);
    setFailed(Object.entries(found).find(([path]) => !shows(path))?.[1] ?? null);
    focusFirstError();
  }

  async function submit(input: unknown) {
    setErrors({});
    setFailed(null);
    const form = schema.safeParse(input);
    if (!form.success) return tell(sentencesOf(form.error.issues));
    setSending(true);
    try {
      setAnswer(await send(form.data));
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      if (told && Object.keys(told.fields).length > 0) tell(told.fields);
      else setFailed(told?.message ?? 'It was not saved. Try again; saving twice keeps one.');
    }
    setSending(false);
  }

  return { errors, failed, sending, answer, submit };
}
