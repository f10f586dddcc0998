import type { Metadata } from 'next';
import { Tokens } from '@/components/settings/Tokens';

export const metadata: Metadata = { title: 'API tokens' };

export default function TokensPage() {
  return <Tokens />;
}
