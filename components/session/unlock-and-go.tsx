'use client'

import { tellTabs } from '@/lib/client/auth-client'
import { leaveFor } from '@/lib/client/leave-for'
import { UnlockForm } from './unlock-form'

/** The unlock form of the page that the server shows for a locked session; leads on to the page that was asked for. */
export function UnlockAndGo({ name, next }: { name: string; next: string }) {
  const goOn = () => {
    tellTabs({ kind: 'unlocked' })
    leaveFor(next)
  }
  return <UnlockForm name={name} takesFocus onUnlocked={goOn} />
}
