import type { Metadata } from 'next';
import { Security } from '@/components/settings/Security';

export const metadata: Metadata = { title: 'Sign-in' };

export default function SecurityPage() {
  return <Security />;
}
