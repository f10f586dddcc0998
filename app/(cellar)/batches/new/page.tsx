import type { Metadata } from 'next';
import { NewBatchPage } from '@/components/batch/NewBatchPage';

export const metadata: Metadata = { title: 'Start a batch' };

/** `?must=<id>&version=2`: from a must sheet. */
export default async function Page({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { must, version } = await searchParams;
  const number = Number(version);
  return <NewBatchPage must={typeof must === 'string' && must !== '' ? must : null} version={Number.isInteger(number) && number > 0 ? number : undefined} />;
}
