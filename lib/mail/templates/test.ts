import type { RenderContext, Rendered, TestPayload } from '../payload';
import { render } from '../render';
import { when } from '../words';

/** Sent because somebody asked whether messages arrive. */
export function testMail({ at, time_zone }: TestPayload, { publicUrl }: RenderContext): Rendered {
  return render('A message to see whether messages arrive', [
    { type: 'title', text: 'Mails of the watch arrive here.' },
    { type: 'prose', text: `You asked for this one on ${when(at, time_zone)}. There is nothing to do.` },
    { type: 'link', label: 'Open the messages', url: `${publicUrl}/settings/messages` },
  ]);
}
