import type { Metadata } from 'next';
import { MustPage } from '@/components/musts/MustPage';

export const metadata: Metadata = { title: 'Must sheet' };

export default async function Page({ params }: { params: Promise<{ id: string }> }) {
  return <MustPage id={(await params).id} />;
}
