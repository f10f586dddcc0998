import { Invitations } from './Invitations';
import { Members } from './Members';

/** Who shares the cellar, and who is asked to. */
export function People() {
  return (
    <>
      <Members />
      <Invitations />
    </>
  );
}
