'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Field, TextField } from '@/components/ui/Field';
import { filled, type Operation } from './description';

const MOST_SHOWN = 20_000;

function Form({ name, schema }: { name: string; schema: unknown }) {
  return (
    <details>
      <summary className="type-label inline-flex min-h-8 cursor-pointer items-center text-ink2">{name}</summary>
      <pre tabIndex={0} className="max-h-72 overflow-auto border bg-well px-3 py-2 font-mono text-[0.75rem]/[1.125rem]">
        {JSON.stringify(schema, null, 2)}
      </pre>
    </details>
  );
}

type Answer = { status: number; text: string };

/** One call: its forms, and a way to send it as the person who looks at it. What changes something asks twice. */
export function TryIt({ operation }: { operation: Operation }) {
  const [values, setValues] = useState<Record<string, string>>({});
  const [body, setBody] = useState('{}');
  const [answer, setAnswer] = useState<Answer | null>(null);
  const [busy, setBusy] = useState(false);
  const [sure, setSure] = useState(false);
  const reads = operation.method === 'GET';
  const missing = operation.parameters.some((parameter) => parameter.in === 'path' && (values[parameter.name] ?? '') === '');
  const path = filled(operation, values);

  async function send() {
    setBusy(true);
    setSure(false);
    try {
      const response = await fetch(path, { method: operation.method, credentials: 'same-origin', ...(operation.body !== null && { headers: { 'content-type': 'application/json' }, body }) });
      const text = await response.text();
      let shown = text;
      try {
        shown = JSON.stringify(JSON.parse(text), null, 2);
      } catch {
        // Not JSON: shown as it is.
      }
      setAnswer({ status: response.status, text: shown.slice(0, MOST_SHOWN) });
    } catch {
      setAnswer({ status: 0, text: 'The server cannot be reached.' });
    } finally {
      setBusy(false);
    }
  }

  return (
    <div className="flex flex-col gap-3 bg-desk px-(--margin) py-4">
      <p className="type-label text-ink2">
        {operation.access === 'anyone' ? 'open to anyone' : operation.access === 'sensor' ? 'a sensor, by its secret' : `needs: ${operation.access}`}; answers {operation.status}
      </p>
      {operation.body !== null && <Form name="form of the body" schema={operation.body} />}
      {operation.answer !== null && <Form name="form of the answer" schema={operation.answer} />}
      <div className="flex flex-wrap gap-3">
        {operation.parameters.map((parameter) => (
          <Field key={parameter.name} label={`${parameter.name}${parameter.in === 'query' && !parameter.required ? ', may be left out' : ''}`} value={values[parameter.name] ?? ''} onChange={(event) => setValues({ ...values, [parameter.name]: event.target.value })} autoComplete="off" className="w-64" />
        ))}
      </div>
      {operation.body !== null && <TextField label="body, JSON" rows={5} value={body} onChange={(event) => setBody(event.target.value)} spellCheck={false} className="max-w-[720px] font-mono" />}
      <div className="flex flex-wrap items-center gap-3">
        {reads || sure ? (
          <Button look={reads ? 'first' : 'final'} disabled={busy || missing} onClick={() => void send()}>
            {reads ? 'Send it' : 'Send it for real'}
          </Button>
        ) : (
          <Button disabled={missing} onClick={() => setSure(true)}>
            Send it
          </Button>
        )}
        <span className="type-label min-w-0 break-all text-ink2">{reads ? path : 'it acts in this cellar, as you'}</span>
      </div>
      <div aria-live="polite">
        {answer && (
          <>
            <p className="type-label pb-1 font-bold">{answer.status === 0 ? 'no answer' : `answered ${answer.status}`}</p>
            <pre tabIndex={0} className="max-h-96 overflow-auto border bg-lit px-3 py-2 font-mono text-[0.75rem]/[1.125rem] whitespace-pre-wrap break-all">
              {answer.text === '' ? '(nothing)' : answer.text}
            </pre>
          </>
        )}
      </div>
    </div>
  );
}
