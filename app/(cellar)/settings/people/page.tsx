import type { Metadata } from 'next';
import { Members } from '@/components/people/Members';

export const metadata: Metadata = { title: 'People' };

export default function MembersPage() {
  return <Members />;
}
