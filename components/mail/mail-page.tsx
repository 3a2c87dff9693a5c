'use client'

import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { apiGet } from '@/lib/client/api'
import { mailKeys } from '@/lib/client/keys/mail'
import { clockTime } from '@/lib/client/wall-clock'
import type { MailPageDto } from '@/lib/schemas/mail'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { MAIL_KIND_WORDS, ROLE_WORDS } from '@/lib/weaning/words'
import { MailLedger } from './mail-ledger'
import { MailScheduleForm } from './mail-schedule-form'

const REFRESH_MS = 10_000

/** What the unit's mail has sent, what failed, what goes next, and for the unit lead when it goes. */
export function MailPage({ initial }: { initial: MailPageDto }) {
  const { data } = useQuery({
    queryKey: mailKeys.unit(initial.unit.id),
    queryFn: ({ signal }) => apiGet<MailPageDto>(`/api/units/${initial.unit.id}/mail`, { signal }),
    initialData: initial,
    refetchInterval: REFRESH_MS,
  })
  const [savedVersion, setSavedVersion] = useState<number | null>(null)
  return (
    <>
      <PageHeading title="Mail" below={`${data.unit.name}. Messages name beds, never patients.`} />
      {data.isKeptAsFiles ? (
        <Notice tone="wait" title="Kept, not sent" className="mb-8">
          No mail server is set up. Messages are kept as files on the server and nobody receives them.
        </Notice>
      ) : null}
      <div className="grid gap-10 desk:grid-cols-[minmax(0,2fr)_minmax(18rem,1fr)]">
        <section aria-labelledby="mail-ledger" className="min-w-0">
          <h2 id="mail-ledger" className="mb-3 text-xl font-bold">
            What went
          </h2>
          <MailLedger data={data} />
        </section>
        <div className="flex flex-col gap-10">
          <section aria-labelledby="mail-next">
            <h2 id="mail-next" className="mb-3 text-xl font-bold">
              What goes next
            </h2>
            <Upcoming data={data} />
          </section>
          {data.maySchedule && data.schedule ? (
            <section aria-labelledby="mail-schedule">
              <h2 id="mail-schedule" className="mb-3 text-xl font-bold">
                When it goes
              </h2>
              <MailScheduleForm
                key={data.schedule.version}
                unitId={data.unit.id}
                schedule={data.schedule}
                isJustSaved={savedVersion === data.schedule.version}
                onSaved={setSavedVersion}
              />
            </section>
          ) : null}
        </div>
      </div>
    </>
  )
}

function Upcoming({ data }: { data: MailPageDto }) {
  const { upcoming, unit, nowMs, schedule } = data
  return (
    <>
      {upcoming.length === 0 ? (
        <p className="text-muted">No scheduled list is switched on. The unit lead can switch one on here.</p>
      ) : null}
      <ul className="flex flex-col gap-3">
        {upcoming.map(({ kind, atMs, toRoles, recipients }) => (
          <li key={kind}>
            <p className="font-semibold">
              {sentenceCase(MAIL_KIND_WORDS[kind])} <span className="figure">{clockTime(atMs, unit.timeZone, nowMs)}</span>
            </p>
            <p className="text-muted">
              {recipients === 0
                ? `Nobody in this unit holds the role (${toRoles.map((role) => ROLE_WORDS[role]).join(', ')}): nobody would receive it.`
                : `To ${toRoles.map((role) => ROLE_WORDS[role]).join(' and ')}: ${recipients} ${recipients === 1 ? 'person' : 'people'}, if anyone is due.`}
            </p>
          </li>
        ))}
      </ul>
      {schedule?.isDecisionOwedOn ? (
        <p className="mt-3 text-muted">
          Decision owed goes to the physicians as soon as a passed trial has waited longer than the protocol allows.
        </p>
      ) : null}
    </>
  )
}
