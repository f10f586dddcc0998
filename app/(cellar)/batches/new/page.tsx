import type { Metadata } from 'next';
import { NewBatchPage } from '@/components/batch/NewBatchPage';

export const metadata: Metadata = { title: 'Start a batch' };

/** `?must=<id>&version=2&og=1.062`: from a must sheet, with the gravity that was measured. */
export default async function Page({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { must, version, og } = await searchParams;
  const number = Number(version);
  return <NewBatchPage must={typeof must === 'string' && must !== '' ? must : null} version={Number.isInteger(number) && number > 0 ? number : undefined} gravity={typeof og === 'string' && /^[01]\.\d{3,4}$/.test(og) ? og : ''} />;
}
