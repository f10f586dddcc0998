'use client';

import { useState } from 'react';
import { Box } from '@/components/ui/Box';
import { Button } from '@/components/ui/Button';

/** The recovery codes, this once. Going on needs a word that they are kept. */
export function RecoveryCodes({ codes, onKept }: { codes: readonly string[]; onKept: () => void }) {
  const [kept, setKept] = useState(false);
  const [copied, setCopied] = useState(false);
  return (
    <div role="region" aria-label="Recovery codes" className="flex flex-col gap-3 border-b-[1.5px] border-ink bg-lit px-(--margin) py-4">
      <h3 className="type-verdict-now">Ten recovery codes, shown this once</h3>
      <p className="type-body max-w-[62ch] text-ink2">Each opens the account once if the authenticator is lost. Keep them on paper, or where you keep passphrases; not on the same phone.</p>
      <ul className="grid max-w-96 grid-cols-2 gap-x-8 gap-y-1 font-mono text-[0.9375rem] font-semibold">
        {codes.map((code) => (
          <li key={code}>{code}</li>
        ))}
      </ul>
      <div className="flex flex-wrap items-center gap-2">
        <Button onClick={() => void navigator.clipboard.writeText(codes.join('\n')).then(() => setCopied(true))}>{copied ? 'Copied' : 'Copy'}</Button>
        <Button onClick={() => window.print()}>Print</Button>
      </div>
      <Box ticked={kept} onTick={setKept}>
        <span className="type-body">I have kept them.</span>
      </Box>
      <Button look="first" disabled={!kept} className="self-start" onClick={onKept}>
        Done
      </Button>
    </div>
  );
}
