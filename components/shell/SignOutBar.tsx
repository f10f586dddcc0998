'use client';

import { Button } from '@/components/ui/Button';
import { StateMark } from '@/components/ui/StateMark';
import { SIGN_OUT_AGAIN, signOut, staySignedIn, useWayOut } from '@/lib/client/sign-in';

/** Says that signing out did not come about: whoever hands the device on has to know. */
export function SignOutBar() {
  const failed = useWayOut() === 'failed';
  return (
    <div role="status">
      {failed && (
        <p className="type-body flex flex-wrap items-center gap-x-3 gap-y-2 border-b bg-desk px-(--margin) py-2 text-ink">
          <StateMark state="Check" />
          <span className="min-w-0 flex-1 basis-56">
            <b className="font-semibold">You are still signed in.</b> {SIGN_OUT_AGAIN}
          </span>
          <Button size="lane" onClick={() => void signOut()}>
            Sign out
          </Button>
          <Button size="lane" onClick={staySignedIn}>
            Stay
          </Button>
        </p>
      )}
    </div>
  );
}
