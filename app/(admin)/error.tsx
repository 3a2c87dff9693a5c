'use client'

import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'

/** A fault in one page of the administration; the frame around it stays. */
export default function AdminError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <Notice tone="stop" title="This page could not be shown" role="alert">
      <p className="max-w-reading">What was saved before is safe. Try again; if it stays, tell those who run Daybreath here.</p>
      {error.digest ? <p className="mt-1 text-muted">Reference {error.digest}</p> : null}
      <Button className="mt-3" onClick={reset}>
        Try again
      </Button>
    </Notice>
  )
}
