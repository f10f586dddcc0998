'use client';

import type { z } from 'zod';
import type { ImportBody, importForm, importList, ImportPreviewBody, importPreviewForm } from '../contracts/imports';
import { sendJson } from './fetcher';
import { refresh, useResource } from './use-resource';

export function useImports() {
  const { data, ...rest } = useResource<z.infer<typeof importList>>('/imports');
  return { imports: data?.items, ...rest };
}

const touched = (path: string) => path.startsWith('/imports') || path.startsWith('/batches') || path.startsWith('/shelf');

/** Looks at a file; nothing is kept. */
export const lookAtFile = (form: z.input<typeof importPreviewForm>) => sendJson<ImportPreviewBody>('POST', '/imports/preview', form);

export async function keepFile(form: z.input<typeof importForm>): Promise<ImportBody> {
  const kept = await sendJson<ImportBody>('POST', '/imports', form);
  await refresh(touched);
  return kept;
}

export async function undoImport(id: string): Promise<void> {
  await sendJson('DELETE', `/imports/${id}`);
  await refresh(touched);
}
