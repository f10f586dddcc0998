import type { Metadata } from 'next';
import { BatchPage } from '@/components/batch/BatchPage';

export const metadata: Metadata = { title: 'Batch' };

export default async function Page({ params }: { params: Promise<{ id: string }> }) {
  return <BatchPage id={(await params).id} />;
}
