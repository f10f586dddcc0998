import type { Metadata } from 'next';
import { CellarSettings } from '@/components/settings/CellarSettings';

export const metadata: Metadata = { title: 'Cellar' };

export default function CellarSettingsPage() {
  return <CellarSettings />;
}
