'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Field, Select } from '@/components/ui/Field';
import { Haze } from '@/components/ui/Haze';
import { ErrorState, FormError } from '@/components/ui/Notice';
import { GroupBar } from '@/components/ui/Page';
import { Sure } from '@/components/ui/Sure';
import { useAct } from '@/components/ui/use-act';
import { ROLE_WORDS } from '@/components/settings/roles';
import { useMe, useMembers } from '@/lib/client/me';
import { changeRole, handOver, removeMember } from '@/lib/client/people';
import { ROLES, type MemberBody, type Role } from '@/lib/contracts/people';

function MemberRow({ member, mine, manage, busy, act, onHandOver }: { member: MemberBody; mine: boolean; manage: boolean; busy: boolean; act: (work: () => Promise<unknown>) => void; onHandOver: () => void }) {
  const { person, role } = member;
  return (
    <li className="grid items-center gap-x-5 gap-y-2 border-b border-rule px-(--margin) py-2 strip:min-h-12 strip:grid-cols-[minmax(0,1fr)_auto]">
      <div className="min-w-0">
        <p className="type-name-low break-words">
          {person.name}
          {mine && <span className="type-label pl-2 text-ink2">you</span>}
        </p>
        <p className="type-label break-words text-ink2">{person.email}</p>
      </div>
      {manage ? (
        <div className="flex flex-wrap items-center gap-2 strip:justify-end">
          <Select label={<span className="heard-only">Role of {person.name}</span>} className="-mt-1 w-60 max-strip:w-full" value={role} disabled={busy} onChange={(event) => act(() => changeRole(person.id, event.target.value as Role))}>
            {ROLES.map((item) => (
              <option key={item} value={item}>
                {ROLE_WORDS[item]}
              </option>
            ))}
          </Select>
          {!mine && (
            <>
              <Button size="normal" look="quiet" disabled={busy} onClick={onHandOver}>
                Hand over
              </Button>
              <Sure word="Take out" yes="Take out" busy={busy} onSure={() => act(() => removeMember(person.id))} />
            </>
          )}
        </div>
      ) : (
        <span className="type-label">{ROLE_WORDS[role]}</span>
      )}
    </li>
  );
}

/** Who shares the cellar; a keeper changes roles, takes people out, hands the cellar over. */
export function Members() {
  const { members, loading, error, retry } = useMembers();
  const { me, may } = useMe();
  const { busy, failed, fields, act, clear } = useAct();
  const [heir, setHeir] = useState<MemberBody['person'] | null>(null);
  const [passphrase, setPassphrase] = useState('');
  const manage = may('members.manage');
  return (
    <section aria-label="Members">
      <GroupBar word="Members" note={members && `${members.length} ${members.length === 1 ? 'person' : 'people'}`} />
      {loading && <Haze height={64} label="Loading the people" className="mx-(--margin) my-3" />}
      {!loading && !members && (
        <ErrorState title="The people did not load" onRetry={retry}>
          {error?.message}
        </ErrorState>
      )}
      {failed && !heir && <FormError>{failed}</FormError>}
      <ul>
        {members?.map((member) => (
          <MemberRow
            key={member.person.id}
            member={member}
            mine={member.person.id === me?.person.id}
            manage={manage}
            busy={busy}
            act={(work) => void act(work)}
            onHandOver={() => {
              clear();
              setPassphrase('');
              setHeir(member.person);
            }}
          />
        ))}
      </ul>
      {heir && (
        <form
          className="flex flex-col gap-3 border-b-[1.5px] border-ink bg-lit px-(--margin) py-4"
          aria-label="Hand the cellar over"
          onSubmit={(event) => {
            event.preventDefault();
            void act(() => handOver(heir.id, passphrase)).then((done) => done && setHeir(null));
          }}
        >
          <h3 className="type-verdict-now">Hand {me?.cellar.name ?? 'the cellar'} over to {heir.name}</h3>
          <p className="type-body max-w-[62ch] text-ink2">They become keeper, you become brewer. Only they can give it back.</p>
          {failed && <FormError>{failed}</FormError>}
          <Field label="your passphrase" type="password" autoComplete="current-password" autoFocus className="max-w-80" value={passphrase} error={fields.passphrase} onChange={(event) => setPassphrase(event.target.value)} />
          <div className="flex gap-2">
            <Button type="submit" look="final" disabled={busy || passphrase === ''}>
              Hand it over
            </Button>
            <Button onClick={() => setHeir(null)}>Keep it</Button>
          </div>
        </form>
      )}
    </section>
  );
}
