import type { Metadata } from 'next';
import { DataPage } from '@/components/data/DataPage';

export const metadata: Metadata = { title: 'Data' };

export default function SettingsPage() {
  return <DataPage />;
}
