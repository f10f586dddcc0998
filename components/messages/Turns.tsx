'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Select } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sentence } from '@/components/ui/Sentence';
import { saveEscalation } from '@/lib/client/messages';
import type { MessagesBody } from '@/lib/contracts/messages';
import { useSaving } from './use-saving';
import { spanOf } from './words';

const AFTER = [5, 10, 15, 30, 60, 120, 240];

type Person = MessagesBody['people'][number];

/** `At once`, `after 30 min without an answer` */
const turnWords = (turn: number, after: number) => (turn === 0 ? 'at once' : `after ${spanOf(turn * after)} without an answer`);

function list(names: readonly string[]): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}

/** Who is told next where nobody says that they have it. */
export function Turns({ messages, maySet }: { messages: MessagesBody; maySet: boolean }) {
  const { escalation, people } = messages;
  const [draft, setDraft] = useState<{ after: number; order: Person[] } | null>(null);
  const { busy, failed, run } = useSaving();
  const after = draft?.after ?? escalation.after_min;
  const order = draft?.order ?? escalation.people;
  const first = people.filter((person) => !order.some(({ id }) => id === person.id));
  // Where everybody waits, the first of the order is told at once.
  const offset = first.length === 0 ? 0 : 1;

  const save = (next: Person[], minutes: number) => run(() => saveEscalation({ after_min: minutes, people: next.map(({ id }) => id) })).then((done) => done && setDraft(null));
  const change = (next: Person[]) => setDraft({ after, order: next });
  const move = (index: number, by: number) => {
    const next = [...order];
    const [person] = next.splice(index, 1);
    next.splice(index + by, 0, person!);
    change(next);
  };

  return (
    <section aria-label="Who is told next">
      <GroupBar word="Who is told next" note="where nobody says “I have it”" />
      {failed && <FormError>{failed}</FormError>}
      <ol>
        {first.length > 0 && (
          <li className="grid items-baseline gap-x-5 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_minmax(0,16rem)_auto]">
            <span className="type-name-low min-w-0">{list(first.map(({ name }) => name))}</span>
            <span className="type-label text-ink2">at once</span>
          </li>
        )}
        {order.map((person, index) => (
          <li key={person.id} className="grid items-center gap-x-5 gap-y-1 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,1fr)_minmax(0,16rem)_auto]">
            <span className="type-name-low min-w-0">{person.name}</span>
            <span className="type-label text-ink2">
              <Sentence>{turnWords(index + offset, after)}</Sentence>
            </span>
            {maySet && (
              <span className="flex flex-wrap gap-2">
                <Button size="lane" look="quiet" disabled={index === 0} aria-label={`${person.name}: sooner`} onClick={() => move(index, -1)}>
                  Sooner
                </Button>
                <Button size="lane" look="quiet" disabled={index === order.length - 1} aria-label={`${person.name}: later`} onClick={() => move(index, 1)}>
                  Later
                </Button>
                <Button size="lane" look="quiet" aria-label={`${person.name}: at once`} onClick={() => change(order.filter(({ id }) => id !== person.id))}>
                  At once
                </Button>
              </span>
            )}
          </li>
        ))}
      </ol>
      {maySet && (
        <div className="flex flex-wrap items-end gap-3 px-(--margin) py-3">
          {first.length > 0 && people.length > 1 && (
            <Select label="Let somebody wait" value="" onChange={(event) => change([...order, ...people.filter(({ id }) => id === event.target.value)])} className="w-56">
              <option value="">Choose who</option>
              {first.map((person) => (
                <option key={person.id} value={person.id}>
                  {person.name}
                </option>
              ))}
            </Select>
          )}
          {order.length > 0 && (
            <Select label="Each after" value={after} onChange={(event) => setDraft({ order, after: Number(event.target.value) })} className="w-36">
              {[...new Set([...AFTER, after])]
                .sort((a, b) => a - b)
                .map((minutes) => (
                  <option key={minutes} value={minutes}>
                    {spanOf(minutes)}
                  </option>
                ))}
            </Select>
          )}
          {draft && (
            <span className="flex gap-2">
              <Button look="first" disabled={busy} onClick={() => void save(order, after)}>
                Tell them so
              </Button>
              <Button look="quiet" onClick={() => setDraft(null)}>
                Leave it
              </Button>
            </span>
          )}
          {order.length === 0 && !draft && <p className="type-reason self-center text-ink2">Everybody is told at once. {people.length < 2 && 'With more people in the cellar, some can wait for others.'}</p>}
        </div>
      )}
    </section>
  );
}
