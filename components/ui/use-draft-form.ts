'use client';

import { useState, type FormEvent } from 'react';
import { useAct } from './use-act';

/** Fields of a form that are wrong, each with what is wrong with it. */
export type Wrong = Record<string, string>;

/** A form of text fields that stays as it was typed until the server has kept it. */
export function useDraftForm<D extends Record<string, string>>(blank: D) {
  const { busy, failed, fields, act, clear } = useAct();
  const [draft, setDraft] = useState(blank);
  const [wrong, setWrong] = useState<Wrong>({});
  const errors = { ...fields, ...wrong };
  return {
    draft,
    setDraft,
    /** For a field's `onChange`. */
    set: (field: keyof D) => (event: { target: { value: string } }) => setDraft((before) => ({ ...before, [field]: event.target.value })),
    errors,
    /** What was wrong with none of the fields. */
    failed: Object.keys(errors).length === 0 ? failed : null,
    sending: busy,
    /** @param work what sends it; where what is typed cannot be sent, what is wrong with it */
    submit: (event: FormEvent, work: (() => Promise<unknown>) | { wrong: Wrong }) => {
      event.preventDefault();
      clear();
      if (typeof work === 'function') {
        setWrong({});
        void act(work);
      } else setWrong(work.wrong);
    },
  };
}
