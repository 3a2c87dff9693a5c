import { AppError, ERROR_STATUS, type ErrorCode, type ErrorDto } from '@/lib/shared/errors'
import { noteHeard } from './live'

/** Dispatched on window when the server says that the screen is locked; the idle guard covers the page. */
export const LOCKED_EVENT = 'daybreath-locked'
/** Dispatched on window when nobody is signed in any more. A page that holds unsaved typing cancels it, and then stays. */
export const SIGNED_OUT_EVENT = 'daybreath-signed-out'

/** A refusal of the server, or no answer at all (`dto` is null then). The message is meant to be read by the person. */
export class ApiError extends Error {
  readonly dto: ErrorDto | null

  constructor(message: string, dto: ErrorDto | null) {
    super(message)
    this.name = 'ApiError'
    this.dto = dto
  }
}

type RequestOptions = {
  /** True when a person caused the request; polling leaves it out, so that it does not keep an abandoned screen open. */
  isActive?: boolean
  signal?: AbortSignal
}

/** Reads JSON from our own API. Throws ApiError. */
export async function apiGet<Answer>(path: string, options: RequestOptions = {}): Promise<Answer> {
  const response = await request(path, {
    method: 'GET',
    headers: activeHeader(options.isActive ?? false),
    signal: options.signal ?? null,
  })
  noteHeard(Date.now())
  return (await response.json()) as Answer
}

/**
 * Sends a change. With the same idempotency key a repeat changes nothing twice. Throws ApiError, whose words say what became of
 * what was sent.
 */
export async function apiPost<Answer>(
  path: string,
  body: unknown,
  options: RequestOptions & { idempotencyKey?: string } = {},
): Promise<Answer> {
  const headers: Record<string, string> = { ...activeHeader(options.isActive ?? true), 'content-type': 'application/json' }
  if (options.idempotencyKey) headers['idempotency-key'] = options.idempotencyKey
  const response = await request(path, { method: 'POST', headers, body: JSON.stringify(body), signal: options.signal ?? null })
  return (await response.json()) as Answer
}

function activeHeader(isActive: boolean): Record<string, string> {
  return isActive ? { 'x-daybreath-active': '1' } : {}
}

async function request(path: string, init: RequestInit & { method: 'GET' | 'POST' }): Promise<Response> {
  if (init.method === 'POST' && !navigator.onLine)
    throw new ApiError('This device is offline. Nothing was recorded; what you typed is still here.', null)
  let response: Response
  try {
    response = await fetch(path, { ...init, cache: 'no-store', credentials: 'same-origin' })
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error
    throw new ApiError(noAnswer(init.method), null)
  }
  if (response.ok) return response
  const dto = await readError(response)
  if (response.status === ERROR_STATUS.UNAUTHENTICATED) leaveForSignIn()
  if (response.status === ERROR_STATUS.LOCKED) window.dispatchEvent(new Event(LOCKED_EVENT))
  throw new ApiError(dto.message, dto)
}

// A request that got no answer may still have arrived: only the server knows, and a repeat with the same key is safe.
function noAnswer(method: 'GET' | 'POST'): string {
  if (method === 'GET') return 'The server did not answer. What stands here may be out of date.'
  return 'The server did not answer, so it may not have been recorded. What you typed is still here: send it again, it cannot be recorded twice.'
}

async function readError(response: Response): Promise<ErrorDto> {
  try {
    const value: unknown = await response.json()
    if (typeof value === 'object' && value !== null && 'code' in value && 'message' in value) return value as ErrorDto
  } catch {
    // Not JSON: an answer from something between us and the server.
  }
  return {
    code: codeOf(response.status),
    message: `The server could not do this (answer ${response.status}). What you typed is still here.`,
    requestId: '',
  }
}

function codeOf(status: number): ErrorCode {
  const found = Object.entries(ERROR_STATUS).find(([, known]) => known === status)
  return found ? (found[0] as ErrorCode) : 'INTERNAL'
}

function leaveForSignIn(): void {
  const mayLeave = window.dispatchEvent(new Event(SIGNED_OUT_EVENT, { cancelable: true }))
  if (!mayLeave) return
  window.location.assign(new URL(`/sign-in?next=${encodeURIComponent(window.location.pathname)}`, window.location.origin))
}

/** The words for any failure of a request. */
export function failureMessage(error: unknown): string {
  if (error instanceof ApiError || error instanceof AppError) return error.message
  return 'Something went wrong on this page. What you typed is still here.'
}
