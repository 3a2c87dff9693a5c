'use client'

import { useRouter } from 'next/navigation'
import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Dialog } from '@/components/ui/dialog'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import type { Submit } from '@/components/forms/use-submit'

type ConflictDialogProps = {
  failure: Submit['failure']
  patientId: string
  /** "screen", "hold": what was recorded by two people. */
  what: string
  /** Records mine as well; left out where that cannot be chosen. */
  onRecordAnyway?: () => void
}

/** Someone else recorded the same step meanwhile: says who and when, and leaves the choice. What was typed stays. */
export function ConflictDialog({ failure, patientId, what, onRecordAnyway }: ConflictDialogProps) {
  const router = useRouter()
  const [answered, setAnswered] = useState<Submit['failure']>(null)
  const isOpen = failure?.code === 'CONFLICT' && failure !== answered
  const close = () => setAnswered(failure)
  return (
    <Dialog isOpen={isOpen} title={`${sentenceCase(what)} not recorded yet`} onClose={close} closeLabel="Back to my form">
      <p>{failure?.message}</p>
      <div className="mt-5 flex flex-wrap gap-3">
        {onRecordAnyway ? (
          <Button
            variant="primary"
            onClick={() => {
              close()
              onRecordAnyway()
            }}
          >
            Record mine as well
          </Button>
        ) : null}
        <Button onClick={() => router.push(`/patients/${patientId}`)}>Leave mine, see what was recorded</Button>
      </div>
    </Dialog>
  )
}
