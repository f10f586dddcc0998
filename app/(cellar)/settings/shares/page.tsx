import type { Metadata } from 'next';
import { AllShares } from '@/components/share/AllShares';

export const metadata: Metadata = { title: 'Share links' };

export default function AllSharesPage() {
  return <AllShares />;
}
