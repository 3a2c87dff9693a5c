'use client'

import { useMutation, useQueryClient } from '@tanstack/react-query'
import { useRef } from 'react'
import { Button } from '@/components/ui/button'
import type { MarkShape } from '@/components/ui/mark'
import { Tag, type Tone } from '@/components/ui/tag'
import { apiPost, failureMessage } from '@/lib/client/api'
import { mailKeys } from '@/lib/client/keys/mail'
import { clockTime } from '@/lib/client/wall-clock'
import type { MailEntryDto, MailPageDto } from '@/lib/schemas/mail'
import { newId } from '@/lib/shared/ids'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import type { MailState } from '@/lib/weaning/vocabulary'
import { MAIL_KIND_WORDS, MAIL_STATE_WORDS } from '@/lib/weaning/words'

const STATE_LOOK: Record<MailState, { shape: MarkShape; tone: Tone }> = {
  queued: { shape: 'ring', tone: 'wait' },
  sending: { shape: 'pause', tone: 'wait' },
  sent: { shape: 'tick', tone: 'calm' },
  kept: { shape: 'square', tone: 'wait' },
  failed: { shape: 'cross', tone: 'stop' },
  unconfirmed: { shape: 'late', tone: 'stop' },
}

const isTrouble = ({ state }: MailEntryDto) => state === 'failed' || state === 'unconfirmed'

/** The ledger: what failed or is not confirmed on top, then everything newest first. */
export function MailLedger({ data }: { data: MailPageDto }) {
  const { entries } = data
  if (entries.length === 0)
    return <p className="text-muted">Nothing has been sent yet. Messages stand here from the first list on.</p>
  const ordered = [...entries.filter(isTrouble), ...entries.filter((entry) => !isTrouble(entry))]
  return (
    <ul className="border-t border-line">
      {ordered.map((entry) => (
        <li key={entry.id} className="border-b border-line py-3">
          <MailEntry entry={entry} data={data} />
        </li>
      ))}
    </ul>
  )
}

function MailEntry({ entry, data }: { entry: MailEntryDto; data: MailPageDto }) {
  const { unit, nowMs, maySchedule } = data
  const look = STATE_LOOK[entry.state]
  const time = (ms: number) => clockTime(ms, unit.timeZone, nowMs)
  return (
    <>
      <div className="flex flex-wrap items-baseline justify-between gap-x-6 gap-y-1">
        <p className="font-semibold">{sentenceCase(MAIL_KIND_WORDS[entry.kind])}</p>
        <Tag shape={look.shape} tone={look.tone}>
          {MAIL_STATE_WORDS[entry.state]}
        </Tag>
      </div>
      <p className="text-muted">
        To {entry.personName ?? 'an address of the unit'}
        {entry.recipient ? <span className="break-all"> ({entry.recipient})</span> : null}, queued{' '}
        <span className="figure">{time(entry.queuedAt)}</span>
        {entry.sentAt === null ? null : (
          <>
            , {MAIL_STATE_WORDS[entry.state]} <span className="figure">{time(entry.sentAt)}</span>
          </>
        )}
        {entry.state === 'queued' && entry.attempts > 0 ? (
          <>
            , next attempt <span className="figure">{time(entry.nextAttemptAt)}</span>
          </>
        ) : null}
      </p>
      {entry.lastError ? <p className="text-stop">{entry.lastError}</p> : null}
      <details>
        <summary className="inline-flex min-h-[44px] cursor-pointer items-center underline underline-offset-4">
          Read the message: {entry.subject}
        </summary>
        <pre className="border-l-4 border-line py-2 [overflow-wrap:anywhere] whitespace-pre-wrap pl-4 font-sans">
          {entry.bodyText}
        </pre>
      </details>
      {maySchedule && isTrouble(entry) ? <SendAgain unitId={unit.id} mailId={entry.id} subject={entry.subject} /> : null}
    </>
  )
}

function SendAgain({ unitId, mailId, subject }: { unitId: string; mailId: string; subject: string }) {
  const queries = useQueryClient()
  const key = useRef(newId())
  const sending = useMutation({
    mutationFn: () => apiPost(`/api/units/${unitId}/mail/${mailId}/resend`, {}, { idempotencyKey: key.current }),
    onSuccess: () => queries.invalidateQueries({ queryKey: mailKeys.root }),
  })
  return (
    <div>
      <Button
        onClick={() => {
          if (!sending.isPending) sending.mutate()
        }}
      >
        Send again<span className="sr-only">: {subject}</span>
      </Button>
      <p role="status" className="text-stop">
        {sending.isError ? failureMessage(sending.error) : ''}
      </p>
    </div>
  )
}
