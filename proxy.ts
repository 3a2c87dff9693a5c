import { NextResponse, type NextRequest } from 'next/server'
import { SESSION_COOKIE_NAMES } from '@/lib/server/session-cookie'

/** Pages that stand open to somebody who is not signed in. */
const OPEN_PAGES = ['/sign-in', '/forgot-password', '/reset-password', '/accept']
const ONE_YEAR_S = 31_536_000

// eslint-disable-next-line no-restricted-properties -- Next replaces it while building
const isDevelopment = process.env.NODE_ENV === 'development'

/** What a page may load: its own files, and scripts and styles that carry this request's nonce. */
function contentPolicy(nonce: string): string {
  return [
    `default-src 'self'`,
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${isDevelopment ? ` 'unsafe-eval'` : ''}`,
    // The development server puts style tags in without a nonce.
    `style-src 'self' ${isDevelopment ? `'unsafe-inline'` : `'nonce-${nonce}'`}`,
    `style-src-attr 'unsafe-inline'`,
    `img-src 'self' data:`,
    `font-src 'self'`,
    `connect-src 'self'${isDevelopment ? ' ws:' : ''}`,
    `object-src 'none'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-ancestors 'none'`,
  ].join('; ')
}

/**
 * Runs before every page: sends people without a session cookie to sign in, and gives the page its content policy. It is a comfort
 * and no protection: whether the session is real and what it may do is decided by the page's verbs.
 */
export function proxy(request: NextRequest): NextResponse {
  const { pathname, search } = request.nextUrl
  const isOpen = OPEN_PAGES.some((page) => pathname === page || pathname.startsWith(`${page}/`))
  if (!isOpen && !SESSION_COOKIE_NAMES.some((name) => request.cookies.has(name))) {
    // Next wants a whole address here and sends it on as a relative one, so the address that people typed stays as it is.
    const next = pathname === '/' ? '' : `?next=${encodeURIComponent(pathname + search)}`
    return NextResponse.redirect(new URL(`/sign-in${next}`, request.url), {
      status: 307,
      headers: { 'cache-control': 'no-store' },
    })
  }
  const nonce = Buffer.from(crypto.getRandomValues(new Uint8Array(16))).toString('base64')
  const policy = contentPolicy(nonce)
  const headers = new Headers(request.headers)
  headers.set('x-nonce', nonce)
  headers.set('x-daybreath-path', pathname + search)
  headers.set('content-security-policy', policy)
  const response = NextResponse.next({ request: { headers } })
  response.headers.set('content-security-policy', policy)
  if (isHttpsAddress()) response.headers.set('strict-transport-security', `max-age=${ONE_YEAR_S}`)
  return response
}

function isHttpsAddress(): boolean {
  // eslint-disable-next-line no-restricted-properties -- only the scheme; the settings as a whole are checked at start
  return (process.env.DAYBREATH_BASE_URL ?? '').startsWith('https://')
}

export const config = {
  // Not for routes (they check the session themselves), not for what the build made, not for files.
  matcher: ['/((?!api/|_next/|favicon.ico|icon.svg).*)'],
}
