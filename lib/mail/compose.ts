import type { AlertPayload, MailPayload, RenderContext, Rendered } from './payload';
import { alertOpened } from './templates/alert-opened';
import { alertRepeated } from './templates/alert-repeated';
import { alertResolved } from './templates/alert-resolved';
import { digestMail } from './templates/digest';
import { ingestMail } from './templates/ingest';
import { lookAgain } from './templates/look-again';
import { several } from './templates/several';
import { testMail } from './templates/test';
import { timerMail } from './templates/timer';

const ALERT_TEMPLATES: Record<AlertPayload['event'], (payload: AlertPayload, context: RenderContext) => Rendered> = {
  opened: alertOpened,
  repeated: alertRepeated,
  look_again: lookAgain,
  resolved: alertResolved,
};

/** One mail for what one person is owed now. @param payloads at least one */
export function compose(payloads: readonly MailPayload[], context: RenderContext): Rendered {
  const [only, ...more] = payloads;
  if (!only) throw new RangeError('A mail needs something to tell.');
  if (more.length) return several(payloads, context);
  switch (only.template) {
    case 'alert':
      return ALERT_TEMPLATES[only.event](only, context);
    case 'ingest':
      return ingestMail(only, context);
    case 'digest':
      return digestMail(only, context);
    case 'timer':
      return timerMail(only, context);
    case 'test':
      return testMail(only, context);
  }
}
