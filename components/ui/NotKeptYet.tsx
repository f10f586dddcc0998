/** What was written here before and has not been sent. */
export const NotKeptYet = ({ className = '' }: { className?: string }) => (
  <p role="status" className={`type-body not-printed border-b border-l-[6px] border-l-ochre bg-lit py-2 pl-3 pr-(--margin) ${className}`}>
    What you wrote here before is still on the page. It is not kept yet.
  </p>
);
