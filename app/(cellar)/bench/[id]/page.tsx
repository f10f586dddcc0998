import type { Metadata } from 'next';
import { BenchPage } from '@/components/bench/BenchPage';

export const metadata: Metadata = { title: 'Bench' };

export default async function Page({ params }: { params: Promise<{ id: string }> }) {
  return <BenchPage id={(await params).id} />;
}
