import type { Metadata } from 'next';
import { AuditTrail } from '@/components/settings/AuditTrail';

export const metadata: Metadata = { title: 'Audit trail' };

export default function AuditTrailPage() {
  return <AuditTrail />;
}
