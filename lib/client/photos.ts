'use client';

import type { z } from 'zod';
import type { photoList, PhotoBody } from '../contracts/photos';
import { sendFile, sendJson, withQuery } from './fetcher';
import { refresh, useResource } from './use-resource';

export type PhotoPlace = { batch: string } | { lot: string };
const listOf = (place: PhotoPlace) => ('batch' in place ? `/batches/${place.batch}/photos` : `/lots/${place.lot}/photos`);

/** The photos of a batch's log, or of a lot and its tasting notes. Asked again before their addresses end. */
export function usePhotos(place: PhotoPlace) {
  const { data, ...rest } = useResource<z.infer<typeof photoList>>(listOf(place), { refreshInterval: 12 * 60_000 });
  return { photos: data?.items, ...rest };
}

export type HangOn = { entry: string } | { lot: string } | { tasting: string };

/** Sends the picture itself; the server reads it, turns it and writes it anew. */
export async function keepPhoto(place: PhotoPlace, on: HangOn, file: Blob): Promise<PhotoBody> {
  const photo = await sendFile<PhotoBody>(withQuery('/photos', { ...on }), file);
  await refresh((path) => path === listOf(place));
  return photo;
}

export async function removePhoto(place: PhotoPlace, id: string): Promise<void> {
  await sendJson('DELETE', `/photos/${id}`);
  await refresh((path) => path === listOf(place));
}
