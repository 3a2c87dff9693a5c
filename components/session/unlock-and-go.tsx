'use client'

import { leaveFor } from '@/lib/client/leave-for'
import { UnlockForm } from './unlock-form'

/** The unlock form of the page that the server shows for a locked session; leads on to the page that was asked for. */
export function UnlockAndGo({ name, next }: { name: string; next: string }) {
  return <UnlockForm name={name} takesFocus onUnlocked={() => leaveFor(next)} />
}
