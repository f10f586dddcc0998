import type { Metadata } from 'next';
import { WebhooksPage } from '@/components/webhooks/WebhooksPage';

export const metadata: Metadata = { title: 'Webhooks' };

export default function SettingsPage() {
  return <WebhooksPage />;
}
