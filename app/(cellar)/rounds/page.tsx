import type { Metadata } from 'next';
import { Rounds } from '@/components/rounds/Rounds';

export const metadata: Metadata = { title: 'Rounds' };

export default function Page() {
  return <Rounds />;
}
