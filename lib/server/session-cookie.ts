// Names only, safe to import anywhere: the proxy merely looks whether a cookie exists, the session itself is checked in session.ts.

export const COOKIE_PREFIX = 'daybreath'

/** Name of the session cookie. Behind https it carries the prefix that browsers accept on secure connections only. */
export function sessionCookieName(baseUrl: string): string {
  return `${baseUrl.startsWith('https://') ? '__Secure-' : ''}${COOKIE_PREFIX}.session_token`
}

/** Both names that the session cookie can have. */
export const SESSION_COOKIE_NAMES = [`${COOKIE_PREFIX}.session_token`, `__Secure-${COOKIE_PREFIX}.session_token`] as const
