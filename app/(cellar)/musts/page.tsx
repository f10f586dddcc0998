import type { Metadata } from 'next';
import { MustList } from '@/components/musts/MustList';

export const metadata: Metadata = { title: 'Must sheets' };

export default function Page() {
  return <MustList />;
}
