import type { Metadata } from 'next';
import { Suspense } from 'react';
import { AlertsPage } from '@/components/alerts/AlertsPage';

export const metadata: Metadata = { title: 'Alerts' };

export default function Page() {
  return (
    <Suspense>
      <AlertsPage />
    </Suspense>
  );
}
