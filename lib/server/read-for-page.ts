import 'server-only'
import { notFound } from 'next/navigation'
import { AppError } from '@/lib/shared/errors'

/** Runs a read for a page: what is not there, or not the reader's, becomes the not-found page. Other refusals go on as they are. */
export function readForPage<Answer>(read: () => Answer): Answer {
  try {
    return read()
  } catch (error) {
    if (error instanceof AppError && (error.code === 'NOT_FOUND' || error.code === 'FORBIDDEN')) notFound()
    throw error
  }
}
