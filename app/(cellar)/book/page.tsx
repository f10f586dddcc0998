import type { Metadata } from 'next';
import { BookPage } from '@/components/book/BookPage';

export const metadata: Metadata = { title: 'Cellar book' };

export default function Page() {
  return <BookPage />;
}
