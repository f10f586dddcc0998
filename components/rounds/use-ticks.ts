'use client';

import { useEffect, useRef, useState } from 'react';
import { ClientError } from '@/lib/client/fetcher';
import { doJob, undoJob } from '@/lib/client/jobs';
import { dropAct } from '@/lib/client/unsent/send';
import { isUnsentJob } from '@/lib/client/unsent/store';
import { useUnsent } from '@/lib/client/unsent/use-unsent';
import { UNDO_S, type JobBody } from '@/lib/contracts/jobs';

export interface Ticks {
  /** Ticked here; each stays in its place for ten seconds, so that it can be taken back there. */
  ticked: ReadonlyMap<string, JobBody>;
  /** Those of them that the server has kept. Until then nothing is said to be done. */
  saved: ReadonlySet<string>;
  /** Those that wait on this device for the network. */
  waiting: ReadonlySet<string>;
  failed: string | null;
  tick: (job: JobBody) => void;
  untick: (job: JobBody) => void;
  fail: (message: string) => void;
}

const said = (error: unknown, title: string) => `${title}: ${error instanceof ClientError ? error.message : 'not saved. Try again.'}`;

export function useTicks(): Ticks {
  const [ticked, setTicked] = useState<ReadonlyMap<string, JobBody>>(new Map());
  const [saved, setSaved] = useState<ReadonlySet<string>>(new Set());
  const [failed, setFailed] = useState<string | null>(null);
  const kept = useUnsent().filter(isUnsentJob).filter(({ act, state }) => act.does === 'done' && state === 'waiting');
  const waiting = new Set(kept.map(({ job }) => job.id));
  const timers = useRef(new Map<string, ReturnType<typeof setTimeout>>());

  useEffect(() => {
    const running = timers.current;
    return () => running.forEach((timer) => clearTimeout(timer));
  }, []);

  const drop = (id: string) => {
    clearTimeout(timers.current.get(id));
    timers.current.delete(id);
    setTicked((before) => new Map([...before].filter(([key]) => key !== id)));
    setSaved((before) => new Set([...before].filter((key) => key !== id)));
  };

  return {
    ticked: new Map([...kept.map(({ job }) => [job.id, job] as const), ...ticked]),
    saved,
    waiting,
    failed,
    fail: setFailed,
    tick: (job) => {
      setFailed(null);
      setTicked((before) => new Map(before).set(job.id, job));
      doJob(job)
        .then((done) => {
          if ('kept' in done) return drop(job.id);
          setSaved((before) => new Set(before).add(job.id));
          timers.current.set(job.id, setTimeout(() => drop(job.id), UNDO_S * 1000));
        })
        .catch((error: unknown) => {
          drop(job.id);
          setFailed(said(error, job.title));
        });
    },
    untick: (job) => {
      if (waiting.has(job.id)) return void dropAct(job.id, 'done');
      // What is still on its way cannot be taken back yet.
      if (!saved.has(job.id)) return;
      undoJob(job.id)
        .then(() => drop(job.id))
        .catch((error: unknown) => setFailed(said(error, job.title)));
    },
  };
}
