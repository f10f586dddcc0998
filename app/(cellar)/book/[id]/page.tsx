import type { Metadata } from 'next';
import { LotPage } from '@/components/book/LotPage';

export const metadata: Metadata = { title: 'Lot' };

export default async function Page({ params }: { params: Promise<{ id: string }> }) {
  return <LotPage id={(await params).id} />;
}
