import type { Metadata } from 'next';
import { ApiPage } from '@/components/api-page/ApiPage';

export const metadata: Metadata = { title: 'API' };

export default function SettingsPage() {
  return <ApiPage />;
}
