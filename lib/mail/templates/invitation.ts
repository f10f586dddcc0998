import type { InvitationLetter, LetterContext } from '../letters';
import type { Rendered } from '../payload';
import { render } from '../render';
import { when } from '../words';

const MAY: Record<InvitationLetter['role'], string> = {
  keeper: 'A keeper runs the cellar: batches, people, sensors, settings.',
  brewer: 'A brewer makes batches: must sheets, the log, bottling, labels, share links.',
  hand: 'A hand helps on the round: reads, looks, ticks jobs, takes alerts in hand.',
  guest: 'A guest looks at batches and bottles, and writes tasting notes.',
};

/** Somebody asks somebody else to share a cellar. */
export function invitation({ cellar, by, role, expires_at, time_zone }: InvitationLetter, { publicUrl, token }: LetterContext): Rendered {
  return render(`${by} asks you to share the cellar ${cellar}`, [
    { type: 'title', text: `Share the cellar ${cellar}` },
    { type: 'prose', text: `${by} asks you to share it as ${role}. ${MAY[role]}` },
    { type: 'link', label: 'Look at the invitation', url: `${publicUrl}/invitation#${token}` },
    { type: 'line', text: `Open until ${when(expires_at, time_zone)}. It works once.` },
    { type: 'foot', text: 'Nothing happens unless you accept. If you do not know who this is, leave it be: no account is made and your address is not kept longer than the invitation.' },
  ]);
}
