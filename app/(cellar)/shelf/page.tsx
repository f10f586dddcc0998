import type { Metadata } from 'next';
import { Shelf } from '@/components/shelf/Shelf';

export const metadata: Metadata = { title: 'Shelf' };

export default function ShelfPage() {
  return <Shelf />;
}
