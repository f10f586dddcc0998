import { endpoints } from '@/lib/contracts/endpoints';
import { route } from '@/lib/http/route';
import { askForLink } from '@/lib/services/people/ask-for-link';

export const POST = route(endpoints.askForSignInLink, ({ body }) => askForLink('sign-in', body.email));
