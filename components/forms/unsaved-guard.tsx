'use client'

import { useRouter } from 'next/navigation'
import { useEffect, useState } from 'react'
import { Button } from '@/components/ui/button'
import { Dialog } from '@/components/ui/dialog'
import { SIGNED_OUT_EVENT } from '@/lib/client/api'

/** Asks before typing is left behind: on closing the tab, on following a link, and when the session ends. */
export function UnsavedGuard({ isDirty }: { isDirty: boolean }) {
  const router = useRouter()
  const [target, setTarget] = useState<string | null>(null)

  useEffect(() => {
    if (!isDirty) return
    const stay = (event: Event) => event.preventDefault()
    const onClick = (event: MouseEvent) => {
      const path = leavesFor(event)
      if (path === null) return
      event.preventDefault()
      event.stopPropagation()
      setTarget(path)
    }
    window.addEventListener('beforeunload', stay)
    window.addEventListener(SIGNED_OUT_EVENT, stay)
    document.addEventListener('click', onClick, true)
    return () => {
      window.removeEventListener('beforeunload', stay)
      window.removeEventListener(SIGNED_OUT_EVENT, stay)
      document.removeEventListener('click', onClick, true)
    }
  }, [isDirty])

  return (
    <Dialog isOpen={target !== null} title="Leave without recording?" onClose={() => setTarget(null)} closeLabel="Stay here">
      <p>What you typed on this page has not been recorded.</p>
      <Button
        variant="danger"
        className="mt-4"
        onClick={() => {
          const path = target
          setTarget(null)
          if (path !== null) router.push(path)
        }}
      >
        Leave the page
      </Button>
    </Dialog>
  )
}

/** The path that a plain click on one of our links would go to, else null. */
function leavesFor(event: MouseEvent): string | null {
  if (event.button !== 0 || event.metaKey || event.ctrlKey || event.shiftKey || event.altKey) return null
  const link = event.target instanceof Element ? event.target.closest('a') : null
  if (!link || link.target === '_blank' || link.hasAttribute('download')) return null
  if (link.origin !== window.location.origin || link.getAttribute('href')?.startsWith('#')) return null
  return `${link.pathname}${link.search}`
}
