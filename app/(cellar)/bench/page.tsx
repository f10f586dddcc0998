import type { Metadata } from 'next';
import { BenchList } from '@/components/bench/BenchList';

export const metadata: Metadata = { title: 'Bench' };

export default function Page() {
  return <BenchList />;
}
