import 'server-only'
import { AppError } from '@/lib/shared/errors'

/** Throws CONFLICT when a change at a known version found another version. */
export function refuseStale(isChanged: boolean): void {
  if (!isChanged)
    throw new AppError('CONFLICT', 'Somebody else changed this meanwhile. Reload the page to see it, then try again.')
}
