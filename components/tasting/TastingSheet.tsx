'use client';

import { useState, type FormEvent } from 'react';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Field, Select, TextField } from '@/components/ui/Field';
import { FormError } from '@/components/ui/Notice';
import { ClientError } from '@/lib/client/fetcher';
import { ASPECTS, FOUND_WORDS, type Aspect, type Found } from './words';

const POINTS = ['', '1', '2', '3', '4', '5'] as const;
type Points = (typeof POINTS)[number];
const SCORES = Array.from({ length: 19 }, (_, index) => 1 + index / 2);

export interface Tasted extends Record<Aspect, number | null> {
  sparkle: Found | null;
  score: number | null;
  words: string | null;
  next_time: string | null;
  /** A guest's name, where they wrote one. */
  name: string | null;
  show_name: boolean;
}

/** The tasting sheet, for a phone at the table: nothing has to be said but something. */
export function TastingSheet({ guest, onSend }: { guest: boolean; onSend: (tasted: Tasted) => Promise<void> }) {
  const [aspects, setAspects] = useState<Record<Aspect, Points>>({ look: '', smell: '', taste: '', balance: '' });
  const [sparkle, setSparkle] = useState<Found | ''>('');
  const [score, setScore] = useState('');
  const [words, setWords] = useState('');
  const [next, setNext] = useState('');
  const [name, setName] = useState('');
  const [show, setShow] = useState(false);
  const [failed, setFailed] = useState<string | null>(null);
  const [sending, setSending] = useState(false);
  const points = (text: Points) => (text === '' ? null : Number(text));

  async function send(event: FormEvent) {
    event.preventDefault();
    setSending(true);
    setFailed(null);
    try {
      await onSend({
        look: points(aspects.look),
        smell: points(aspects.smell),
        taste: points(aspects.taste),
        balance: points(aspects.balance),
        sparkle: sparkle || null,
        score: score === '' ? null : Number(score),
        words: words.trim() || null,
        next_time: next.trim() || null,
        name: name.trim() || null,
        show_name: show,
      });
    } catch (error) {
      const told = error instanceof ClientError ? error : null;
      setFailed(Object.values(told?.fields ?? {})[0]?.[0] ?? told?.message ?? 'It was not kept. Try again.');
    }
    setSending(false);
  }

  return (
    <form onSubmit={(event) => void send(event)} className="flex flex-col gap-3">
      {ASPECTS.map((aspect) => (
        <Choice key={aspect} label={`${aspect}, 1 poor to 5 fine`} value={aspects[aspect]} onChoose={(value) => setAspects((before) => ({ ...before, [aspect]: value }))} options={POINTS.map((value) => ({ value, name: value === '' ? <span className="whitespace-nowrap">not said</span> : value }))} />
      ))}
      <div className="grid grid-cols-2 gap-3">
        <Select label="sparkle" value={sparkle} onChange={(event) => setSparkle(event.target.value as Found | '')}>
          <option value="">not said</option>
          {(Object.keys(FOUND_WORDS) as Found[]).map((found) => (
            <option key={found} value={found}>
              {FOUND_WORDS[found]}
            </option>
          ))}
        </Select>
        <Select label="score of 10" value={score} onChange={(event) => setScore(event.target.value)}>
          <option value="">not said</option>
          {SCORES.map((one) => (
            <option key={one} value={one}>
              {one.toFixed(1)}
            </option>
          ))}
        </Select>
      </div>
      {sparkle === 'gushing' && <p className="type-body border-l-[3px] border-madder pl-3">The other bottles of the lot may gush too. Gloves and eye protection; move them somewhere cold, and let the gas out outdoors.</p>}
      <TextField label="in your words" value={words} maxLength={1000} onChange={(event) => setWords(event.target.value)} />
      <TextField label="next time" rows={2} value={next} maxLength={500} hint="It goes along when the must sheet is copied." onChange={(event) => setNext(event.target.value)} />
      {guest ? (
        <Field label="your name, if you like" hint="A name may stand beside your words on this page." value={name} maxLength={40} autoComplete="off" onChange={(event) => setName(event.target.value)} />
      ) : (
        <Box ticked={show} onTick={setShow}>
          <span className="type-body">My name may stand on the share page.</span>
        </Box>
      )}
      {failed && <FormError>{failed}</FormError>}
      <Button type="submit" look="first" size="tall" disabled={sending} className="self-end">
        Tasted
      </Button>
    </form>
  );
}
