'use client'

import { useCallback, useEffect, useRef, useState } from 'react'
import { LOCKED_EVENT } from '@/lib/client/api'
import { fetchMe, joinTabs, sendLock } from '@/lib/client/auth-client'
import { leaveFor } from '@/lib/client/leave-for'

const CHECK_EVERY_MS = 1_000
const TELL_EVERY_MS = 5_000
const ACTIVITY = ['pointerdown', 'pointermove', 'keydown', 'wheel', 'touchstart'] as const

type IdleLock = { isLocked: boolean; open: () => void }

/**
 * Watches whether somebody works at this screen, in this tab or another of the same browser, and locks after `idleLockMin` minutes
 * without. Also locks when the server says so. Activity is told to the server now and then; polling never counts as activity.
 */
export function useIdleLock({ email, idleLockMin }: { email: string; idleLockMin: number }): IdleLock {
  const [isLocked, setLocked] = useState(false)
  const onOpened = useRef<() => void>(() => {})
  const open = useCallback(() => onOpened.current(), [])

  useEffect(() => {
    const limitMs = idleLockMin * 60_000
    const beatMs = Math.min(30_000, limitMs / 4)
    let isCovered = false
    let toldAt = 0
    let beatAt = Date.now()
    let lastActiveAt = Date.now()

    const cover = (isOurs: boolean) => {
      if (isCovered) return
      isCovered = true
      setLocked(true)
      if (!isOurs) return
      tabs.tell({ kind: 'locked' })
      void sendLock()
    }
    const uncover = () => {
      isCovered = false
      lastActiveAt = Date.now()
      setLocked(false)
    }
    // Another tab, or the same person after a new sign-in, may have opened the screen; somebody else must not see what was typed here.
    const recheck = async () => {
      const me = await fetchMe(false)
      if (me === undefined || !isCovered) return
      if (me !== null && me.email !== email) leaveFor('/')
      else if (me !== null && !me.isLocked) uncover()
    }
    const tabs = joinTabs((news) => {
      if (news.kind === 'active') lastActiveAt = Date.now()
      if (news.kind === 'locked') cover(false)
      if (news.kind === 'unlocked') void recheck()
      if (news.kind === 'signed_out') {
        cover(false)
        leaveFor('/sign-in')
      }
    })
    onOpened.current = () => {
      uncover()
      tabs.tell({ kind: 'unlocked' })
    }
    const check = () => {
      if (Date.now() - lastActiveAt >= limitMs) cover(true)
    }
    const onActivity = () => {
      // After the computer slept, the first touch must find the screen locked rather than count as work.
      check()
      if (isCovered) return
      const now = Date.now()
      lastActiveAt = now
      if (now - toldAt >= TELL_EVERY_MS) {
        toldAt = now
        tabs.tell({ kind: 'active' })
      }
      if (now - beatAt >= beatMs) {
        beatAt = now
        void fetchMe(true).then((me) => {
          if (me?.isLocked) cover(true)
        })
      }
    }
    const onReturn = () => {
      // A cover put up in this moment is not asked about: its lock is still on the way to the server.
      if (!isCovered) check()
      else if (document.visibilityState === 'visible') void recheck()
    }
    const onServerLock = () => cover(true)

    const timer = setInterval(check, CHECK_EVERY_MS)
    for (const kind of ACTIVITY) window.addEventListener(kind, onActivity, { capture: true, passive: true })
    window.addEventListener(LOCKED_EVENT, onServerLock)
    window.addEventListener('pageshow', onReturn)
    window.addEventListener('focus', onReturn)
    document.addEventListener('visibilitychange', onReturn)
    return () => {
      clearInterval(timer)
      for (const kind of ACTIVITY) window.removeEventListener(kind, onActivity, { capture: true })
      window.removeEventListener(LOCKED_EVENT, onServerLock)
      window.removeEventListener('pageshow', onReturn)
      window.removeEventListener('focus', onReturn)
      document.removeEventListener('visibilitychange', onReturn)
      tabs.leave()
    }
  }, [email, idleLockMin])

  return { isLocked, open }
}
