import type { Metadata } from 'next';
import { TakePage } from '@/components/messages/TakePage';

/** The address is the key: it is kept out of search engines and out of other sites' logs. */
export const metadata: Metadata = { title: 'I have it', robots: { index: false, follow: false }, referrer: 'no-referrer' };

export default async function Page({ params }: { params: Promise<{ token: string }> }) {
  return <TakePage token={(await params).token} />;
}
