import type { LetterContext, LetterPayload } from './letters';
import type { Rendered } from './payload';
import { invitation } from './templates/invitation';
import { link } from './templates/link';
import { notice } from './templates/notice';

export function composeLetter(payload: LetterPayload, context: LetterContext): Rendered {
  switch (payload.template) {
    case 'invitation':
      return invitation(payload, context);
    case 'link':
      return link(payload, context);
    case 'notice':
      return notice(payload, context);
  }
}
