import { env } from '../config/env';

const secure = () => env().PUBLIC_URL.startsWith('https:');
/** `__Host-` binds a cookie to this one host and to https; over plain http a browser refuses it. */
const named = (name: string) => (secure() ? `__Host-${name}` : name);

/** Names a sign-in, signed and encrypted. */
export const sessionCookie = () => named('fallbright-session');
/** Which of the person's cellars the browser shows. */
export const cellarCookie = () => named('fallbright-cellar');

export const cookieOptions = () => ({ httpOnly: true, sameSite: 'lax' as const, path: '/', secure: secure() });

/** The three cookies of next-auth, under our names. */
export const nextAuthCookies = () => ({
  sessionToken: { name: sessionCookie(), options: cookieOptions() },
  csrfToken: { name: named('fallbright-csrf'), options: cookieOptions() },
  callbackUrl: { name: named('fallbright-callback'), options: cookieOptions() },
});

/** A `Set-Cookie` value for a year, with the options above. */
export function setCookie(name: string, value: string): string {
  const { secure: onlyHttps } = cookieOptions();
  return `${name}=${encodeURIComponent(value)}; Path=/; Max-Age=31536000; HttpOnly; SameSite=Lax${onlyHttps ? '; Secure' : ''}`;
}
