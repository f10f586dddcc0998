'use client';

import { Haze } from '@/components/ui/Haze';
import { ErrorState } from '@/components/ui/Notice';
import { ROLE_WORDS } from '@/components/settings/roles';
import { useMembers } from '@/lib/client/me';

/** Who shares the cellar. */
export function Members() {
  const { members, loading, error, retry } = useMembers();
  if (loading) return <Haze height={48} label="Loading the people" className="mx-(--margin) my-3" />;
  if (!members) return <ErrorState title="The people did not load" onRetry={retry}>{error?.message}</ErrorState>;
  return (
    <ul>
      {members.map((member) => (
        <li key={member.person.id} className="grid items-baseline gap-x-5 border-b border-rule px-(--margin) py-2 strip:grid-cols-[minmax(0,12rem)_minmax(0,1fr)_auto]">
          <span className="type-name-low">{member.person.name}</span>
          <span className="type-label min-w-0 break-words text-ink2">{member.person.email}</span>
          <span className="type-label">{ROLE_WORDS[member.role]}</span>
        </li>
      ))}
    </ul>
  );
}
