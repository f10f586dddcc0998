import type { Metadata } from 'next';
import { CataloguePage } from '@/components/musts/CataloguePage';

export const metadata: Metadata = { title: 'Catalogue' };

export default function Page() {
  return <CataloguePage />;
}
