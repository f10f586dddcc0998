import type { IngestPayload, RenderContext, Rendered } from '../payload';
import { render, type Block } from '../render';
import { lasting, when } from '../words';

/** The house itself takes no readings, or takes them again. */
export function ingestMail({ event, since, at, time_zone }: IngestPayload, { publicUrl }: RenderContext): Rendered {
  const link: Block = { type: 'link', label: 'Open the sensors', url: `${publicUrl}/sensors` };
  if (event === 'resolved') {
    return render('Passed: readings come in again', [
      { type: 'state', word: 'Cleared', colour: 'green' },
      { type: 'prose', text: `Fallbright takes readings again. It took none from ${when(since, time_zone)}, for ${lasting(since, at)}. Sensors send what they kept; the curves catch up by themselves.` },
      link,
    ]);
  }
  return render(`Check${event === 'repeated' ? ', still' : ''}: no readings come in from any sensor`, [
    { type: 'state', word: 'Check', colour: 'ochre' },
    { type: 'title', text: 'No readings come in from any sensor.' },
    { type: 'line', text: `Since ${when(since, time_zone)}, ${lasting(since, at)}.` },
    { type: 'prose', text: 'The part of Fallbright that takes readings has stopped. Sensors keep what they measure and send it later. Until then no vessel is watched: stalls, foam and temperature go unseen, and no sensor is called silent for it.' },
    { type: 'part', label: 'do first', text: 'Look at the vessels yourself. On the machine that runs Fallbright, see whether the broker runs and read its log; start it again.' },
    link,
    { type: 'foot', text: 'You get this once for the house, not once for each sensor.' },
  ]);
}
