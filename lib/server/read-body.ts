import 'server-only'
import { AppError } from '@/lib/shared/errors'

/**
 * The JSON that a request carries, as yet unchecked; undefined for an empty body. Reads no further than `mostBytes`, so that nobody fills
 * the memory. Throws INVALID when it is longer, is not sent as JSON, or does not parse.
 */
export async function readJsonBody(request: Request, mostBytes: number): Promise<unknown> {
  const text = await readTextUpTo(request, mostBytes)
  if (text === null) throw new AppError('INVALID', 'That is more than a form can hold. Nothing was recorded.')
  if (text === '') return undefined
  const type = request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase()
  const value = type === 'application/json' ? parseOrUndefined(text) : undefined
  if (value === undefined) throw new AppError('INVALID', 'The request was not readable. Nothing was recorded.')
  return value
}

async function readTextUpTo(request: Request, mostBytes: number): Promise<string | null> {
  if (Number(request.headers.get('content-length') ?? 0) > mostBytes) return null
  if (!request.body) return ''
  const reader = request.body.getReader()
  const chunks: Uint8Array[] = []
  let size = 0
  for (;;) {
    const { done, value } = await reader.read()
    if (done) return new TextDecoder().decode(Buffer.concat(chunks))
    size += value.byteLength
    // The rest stays unread; the server drops it with the connection's next request.
    if (size > mostBytes) return null
    chunks.push(value)
  }
}

function parseOrUndefined(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return undefined
  }
}
