import type { ReactNode } from 'react';
import { Button } from './Button';
import { State } from './StateMark';

/** Something that did not load: what happened, what is safe, what to do. */
export function ErrorState({ title, children, onRetry }: { title: string; children: ReactNode; onRetry?: () => void }) {
  return (
    <section role="alert" className="flex flex-col items-start gap-2 border-b px-(--margin) py-6">
      <State state="Check" word="Not shown" />
      <h2 className="type-verdict-now">{title}</h2>
      <div className="type-body max-w-[62ch] text-ink2">{children}</div>
      {onRetry && <Button onClick={onRetry}>Try again</Button>}
    </section>
  );
}

/** Nothing here yet, and the one thing to do about it. */
export function EmptyState({ title, children, action }: { title: string; children: ReactNode; action?: ReactNode }) {
  return (
    <section className="flex flex-col items-start gap-2 border-b px-(--margin) py-6">
      <State state="Leave be" word="Empty" />
      <h2 className="type-verdict-now">{title}</h2>
      <div className="type-body max-w-[62ch] text-ink2">{children}</div>
      {action}
    </section>
  );
}

/** One sentence about what was just asked: said to those who hear the page. */
export function FormError({ children }: { children: ReactNode }) {
  return (
    <p role="alert" className="type-body flex items-start gap-2 border-l-[3px] border-madder bg-lit py-2 pl-3 pr-3 text-madder">
      {children}
    </p>
  );
}
