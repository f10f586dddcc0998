import type { Metadata } from 'next';
import { NewMust } from '@/components/musts/NewMust';

export const metadata: Metadata = { title: 'New must sheet' };

export default function Page() {
  return <NewMust />;
}
