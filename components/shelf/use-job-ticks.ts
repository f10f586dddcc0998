'use client';

import { useState } from 'react';
import { acknowledgeAlert } from '@/lib/client/alerts';
import { ClientError } from '@/lib/client/fetcher';
import type { Job } from './jobs';

export interface JobTicks {
  /** Ticked here and not yet confirmed by the server. */
  waiting: ReadonlySet<string>;
  failed: string | null;
  take: (job: Job) => Promise<void>;
}

/** Ticking a job is saying `I have it`: it goes in hand, and nobody else is told about it again. */
export function useJobTicks(): JobTicks {
  const [waiting, setWaiting] = useState<ReadonlySet<string>>(new Set());
  const [failed, setFailed] = useState<string | null>(null);

  async function take(job: Job) {
    if (!job.alertId || job.who !== null || waiting.has(job.key)) return;
    setFailed(null);
    setWaiting((keys) => new Set(keys).add(job.key));
    try {
      await acknowledgeAlert(job.alertId);
    } catch (error) {
      setFailed(`${job.text} was not taken. ${error instanceof ClientError ? error.message : 'Try again.'}`);
    } finally {
      setWaiting((keys) => new Set([...keys].filter((key) => key !== job.key)));
    }
  }

  return { waiting, failed, take };
}
