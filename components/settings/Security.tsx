import { GroupBar } from '@/components/ui/Page';
import { AccountTrail } from './AccountTrail';
import { MailAddress } from './MailAddress';
import { Passphrase } from './Passphrase';
import { SecondFactor } from './SecondFactor';
import { SignIns } from './SignIns';

/** How one gets in, and who else might have. */
export function Security() {
  return (
    <>
      <section aria-label="Passphrase">
        <GroupBar word="Passphrase" />
        <Passphrase />
      </section>
      <section aria-label="Mail address">
        <GroupBar word="Mail address" />
        <MailAddress />
      </section>
      <section aria-label="Second factor">
        <GroupBar word="Second factor" note="a code of your authenticator at every sign-in" />
        <SecondFactor />
      </section>
      <section aria-label="Signed in">
        <GroupBar word="Signed in" note="where you are signed in" />
        <SignIns />
      </section>
      <section aria-label="Your account">
        <GroupBar word="What happened" note="to your account, newest first" />
        <AccountTrail />
      </section>
    </>
  );
}
