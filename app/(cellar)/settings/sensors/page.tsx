import type { Metadata } from 'next';
import { LimitsPage } from '@/components/sensors/LimitsForm';

export const metadata: Metadata = { title: 'Sensors' };

export default function SettingsPage() {
  return <LimitsPage />;
}
