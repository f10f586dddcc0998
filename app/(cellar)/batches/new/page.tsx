import type { Metadata } from 'next';
import { NewBatchPage } from '@/components/batch/NewBatchPage';

export const metadata: Metadata = { title: 'Start a batch' };

export default function Page() {
  return <NewBatchPage />;
}
