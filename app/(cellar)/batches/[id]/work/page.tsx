import type { Metadata } from 'next';
import { CellarWork } from '@/components/family/CellarWork';

export const metadata: Metadata = { title: 'Cellar work' };

export default async function Page({ params }: { params: Promise<{ id: string }> }) {
  return <CellarWork batchId={(await params).id} />;
}
