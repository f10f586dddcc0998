import type { Metadata } from 'next';
import { SharedPage } from '@/components/share/SharedPage';

/** The address is the key: it is kept out of search engines and out of other sites' logs. */
export const metadata: Metadata = { title: 'A shared batch', robots: { index: false, follow: false }, referrer: 'no-referrer' };

export default async function Page({ params }: { params: Promise<{ token: string }> }) {
  return <SharedPage token={(await params).token} />;
}
