'use client';

import type { z } from 'zod';
import type { CalendarBody, createJob as createSchema, JOB_STATES, JobBody, JobList, UpdateJob } from '../contracts/jobs';
import { sendJson, withQuery } from './fetcher';
import { sendOrKeepAct, type Sent } from './unsent/send';
import { isPath, refresh, useResource } from './use-resource';

/** The rounds. `until` keeps to what is due by then; null waits. */
export function useJobs(query: { state?: (typeof JOB_STATES)[number]; until?: string; batch?: string; lot?: string; order?: 'due' | 'walk'; limit?: number; cursor?: string } | null = {}) {
  const { data, ...rest } = useResource<JobList>(query && withQuery('/jobs', query));
  return { jobs: data?.items, now: data?.now, nextCursor: data?.next_cursor ?? null, ...rest };
}

async function changed<T>(answer: T): Promise<T> {
  await refresh((path) => isPath('/jobs')(path) || isPath('/alerts')(path));
  return answer;
}

export const createJob = async (input: z.input<typeof createSchema>) => changed(await sendJson<JobBody>('POST', '/jobs', input));
export const updateJob = async (id: string, input: UpdateJob) => changed(await sendJson<JobBody>('PATCH', `/jobs/${id}`, input));
export const dropJob = async (id: string) => changed(await sendJson<null>('DELETE', `/jobs/${id}`));
/** Ticks a job as of now; away from the network it is kept on this device and sent later. */
export const doJob = async (job: JobBody): Promise<Sent<JobBody>> => changed(await sendOrKeepAct(job, { does: 'done', at: new Date().toISOString() }));
/** Within ten seconds of the tick. */
export const undoJob = async (id: string) => changed(await sendJson<JobBody>('POST', `/jobs/${id}/undo`));
export const takeJob = async (id: string, taken = true) => changed(await sendJson<JobBody>('POST', `/jobs/${id}/take`, { taken }));
export const snoozeJob = async (job: JobBody, until: string): Promise<Sent<JobBody>> => changed(await sendOrKeepAct(job, { does: 'snooze', until }));

/** The person's own calendar address of the rounds. */
export function useCalendar() {
  const { data, ...rest } = useResource<CalendarBody>('/calendar');
  return { calendar: data, ...rest };
}

export async function makeCalendar(): Promise<CalendarBody> {
  const made = await sendJson<CalendarBody>('POST', '/calendar');
  await refresh(isPath('/calendar'));
  return made;
}

export async function endCalendar(): Promise<void> {
  await sendJson('DELETE', '/calendar');
  await refresh(isPath('/calendar'));
}
