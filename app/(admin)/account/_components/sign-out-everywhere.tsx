'use client'

import { useMutation } from '@tanstack/react-query'
import { Button } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { apiPost, failureMessage } from '@/lib/client/api'
import { leaveFor } from '@/lib/client/leave-for'

/** Ends every session of this person, here included. */
export function SignOutEverywhere() {
  const ending = useMutation({
    mutationFn: () => apiPost('/api/session/end-all', {}),
    onSuccess: () => leaveFor('/sign-in?done=everywhere'),
  })
  return (
    <>
      <p className="mb-3 max-w-reading">
        If you left a computer signed in, or think that somebody knows your password, end every session at once.
      </p>
      <Button
        onClick={() => {
          if (!ending.isPending) ending.mutate()
        }}
      >
        Sign out everywhere
      </Button>
      <div role="alert">
        {ending.isError ? <Notice tone="stop" title={failureMessage(ending.error)} className="mt-3" /> : null}
      </div>
    </>
  )
}
