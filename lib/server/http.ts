import 'server-only'
import { z } from 'zod'
import { AppError, AuditedRefusal, ERROR_STATUS, type ErrorDto } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'
import { writeAudit } from './audit'
import { requestDatabase } from './database'
import { readEnv } from './env'
import { log } from './log'
import { readJsonBody } from './read-body'
import { requireActor } from './session'
import type { Actor, Ctx } from './ctx'

type RouteParams = { params: Promise<Record<string, string | string[] | undefined>> }
type HandleOptions<Schema extends z.ZodType, Answer> = {
  /** Parses the body (or the query of a GET) together with the route's parameters. */
  input: Schema
  run: (ctx: Ctx, input: z.output<Schema>) => Answer | Promise<Answer>
  /** Turns the answer into a response; JSON when absent. */
  respond?: (answer: Answer) => Response
  /** Who may call: a signed-in person at an open screen (when absent), also at a locked one, or anybody at all. */
  session?: 'open' | 'even_locked' | 'none'
}

/** Makes a route handler: same-origin check, session, parse, run, errors to HTTP, never stored by any cache. */
export function handle<Schema extends z.ZodType, Answer>(options: HandleOptions<Schema, Answer>) {
  return async (request: Request, route: RouteParams): Promise<Response> => {
    const requestId = newId()
    let ctx: Ctx | undefined
    try {
      refuseForeignOrigin(request)
      const actor = await findActor(request, options.session ?? 'open')
      const input = await parseInput(options.input, request, await route.params)
      const idempotencyKey = readIdempotencyKey(request)
      ctx = { actor, now: Date.now(), requestId, db: requestDatabase(), idempotencyKey }
      const answer = await options.run(ctx, input)
      return options.respond ? noStore(options.respond(answer)) : noStore(Response.json(answer ?? null))
    } catch (error) {
      return noStore(toErrorResponse(ctx ? recordRefusal(ctx, request, error) : error, requestId))
    }
  }
}

function readIdempotencyKey(request: Request): string | null {
  const key = request.method === 'GET' ? null : request.headers.get('idempotency-key')
  if (key !== null && (key === '' || key.length > LONGEST_KEY))
    throw new AppError('INVALID', 'The request was not readable. Nothing was recorded.')
  return key
}

async function findActor(request: Request, session: 'open' | 'even_locked' | 'none'): Promise<Actor> {
  if (session === 'none') return { kind: 'system' }
  return requireActor(request, { evenLocked: session === 'even_locked' })
}

/** A write must come from our own pages: cookies alone are not enough. */
export function refuseForeignOrigin(request: Request): void {
  if (request.method === 'GET' || request.method === 'HEAD') return
  const origin = request.headers.get('origin')
  if (origin !== new URL(readEnv().baseUrl).origin)
    throw new AppError('FORBIDDEN', 'This request did not come from a Daybreath page.')
}

async function parseInput<Schema extends z.ZodType>(
  schema: Schema,
  request: Request,
  params: Record<string, string | string[] | undefined>,
): Promise<z.output<Schema>> {
  const given = request.method === 'GET' ? Object.fromEntries(new URL(request.url).searchParams) : await readBody(request)
  // What the address names wins over what the body or query claims.
  const parsed = schema.safeParse({ ...given, ...params })
  if (parsed.success) return parsed.data
  const fields: Record<string, string> = {}
  for (const issue of parsed.error.issues) fields[issue.path.join('.')] ??= issue.message
  throw new AppError('INVALID', 'Please look at the marked fields. Nothing was recorded.', fields)
}

const LONGEST_KEY = 100
const LONGEST_BODY_BYTES = 100_000

async function readBody(request: Request): Promise<Record<string, unknown>> {
  const value = (await readJsonBody(request, LONGEST_BODY_BYTES)) ?? {}
  if (typeof value === 'object' && !Array.isArray(value)) return value as Record<string, unknown>
  throw new AppError('INVALID', 'The request was not readable. Nothing was recorded.')
}

/**
 * A refusal by the verb itself (not its author, not in this episode) is written down here, since what the verb began was undone. Answers the
 * refusal, or the fault when it could not be written down.
 */
function recordRefusal(ctx: Ctx, request: Request, error: unknown): unknown {
  if (ctx.actor.kind !== 'person' || !(error instanceof AppError) || error instanceof AuditedRefusal) return error
  const { code } = error
  if (code !== 'FORBIDDEN' && code !== 'NOT_FOUND') return error
  const asked = `${request.method} ${new URL(request.url).pathname}`.slice(0, 200)
  try {
    ctx.db.transaction((tx) => writeAudit(tx, ctx, { action: 'access.denied', after: { asked, code } }), {
      behavior: 'immediate',
    })
    return error
  } catch (fault) {
    return fault
  }
}

/** The one place that turns an error into HTTP. Foreign errors never show their text. */
export function toErrorResponse(error: unknown, requestId: string): Response {
  if (error instanceof AppError) {
    const dto: ErrorDto = {
      code: error.code,
      message: error.message,
      requestId,
      ...(error.fields ? { fields: error.fields } : {}),
    }
    if (error.code === 'FORBIDDEN' || error.code === 'RATE_LIMITED') log.warn({ requestId, code: error.code }, 'refused')
    return Response.json(dto, { status: ERROR_STATUS[error.code] })
  }
  log.error({ requestId, err: error instanceof Error ? { name: error.name, stack: error.stack } : 'unknown' }, 'fault')
  const dto: ErrorDto = {
    code: 'INTERNAL',
    message: `Something went wrong on the server, and nothing was recorded. Reference ${requestId}.`,
    requestId,
  }
  return Response.json(dto, { status: 500 })
}

/** Marks a response as never to be kept by any cache. */
export function noStore(response: Response): Response {
  response.headers.set('cache-control', 'no-store')
  return response
}
