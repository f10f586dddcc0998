import type { Metadata } from 'next';
import { SignIns } from '@/components/settings/SignIns';

export const metadata: Metadata = { title: 'Sign-in' };

export default function SignInsPage() {
  return <SignIns />;
}
