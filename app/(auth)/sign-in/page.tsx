import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { UnsentNotice } from '@/components/offline/UnsentNotice';
import { Settling } from '@/components/sign-in/Settling';
import { SignInForm } from '@/components/sign-in/SignInForm';
import { Wordmark } from '@/components/ui/Mark';
import { currentSession } from '@/lib/auth/session';

export const metadata: Metadata = { title: 'Sign in' };

/** Where to go afterwards: a page of this house, never another's. */
function pageOf(to: string | string[] | undefined): string {
  return typeof to === 'string' && /^\/(?![/\\])/.test(to) ? to : '/shelf';
}

/** Why somebody stands here who did not ask to. */
const SAID: Record<string, string> = {
  deleted: 'Your account is deleted. A mail confirms it.',
  ended: 'This sign-in has ended. Sign in to go on.',
};

export default async function SignInPage({ searchParams }: { searchParams: Promise<{ next?: string | string[]; said?: string | string[] }> }) {
  const { next, said } = await searchParams;
  const to = pageOf(next);
  const sentence = typeof said === 'string' && Object.hasOwn(SAID, said) ? SAID[said] : null;
  if (await currentSession()) redirect(to);
  return (
    <div className="flex min-h-dvh flex-col wide:flex-row">
      <div className="flex flex-1 flex-col bg-desk px-(--margin) pt-6 wide:px-10 wide:pb-[58px] wide:pt-11">
        <Wordmark size={32} />
        <h1 className="type-display mt-6 max-strip:text-[1.875rem]! max-strip:leading-[2.125rem]! wide:mt-10">To fall bright: to clear by itself.</h1>
        <p className="mt-2 pb-6 text-[1.0625rem] leading-6 text-ink2 max-strip:text-[0.9375rem]">A watch on every vessel while it does. What to do next, when, and why.</p>
        <Settling days={[1, 9, 24, 46, 90]} className="mt-auto hidden max-h-[58vh] max-w-[920px] wide:block" />
      </div>
      <div className="flex flex-col justify-center px-(--margin) py-8 max-wide:border-t-[1.5px] max-wide:border-ink wide:w-[461px] wide:border-l-[1.5px] wide:border-ink wide:pl-[57px] wide:pr-14">
        <div className="w-full max-w-[420px] wide:-mt-32">
          <UnsentNotice />
          {sentence && (
            <p role="status" className="type-body mb-5 border-l-[3px] border-ink bg-lit py-2 pl-3 pr-3">
              {sentence}
            </p>
          )}
          <SignInForm to={to} />
        </div>
      </div>
      <div className="bg-desk px-(--margin) pt-8 wide:hidden">
        <Settling days={[1, 24, 90]} className="max-w-[560px]" />
      </div>
    </div>
  );
}
