import { ButtonLink } from '@/components/ui/button'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import type { ProtocolPageDto, ProtocolVersionDto } from '@/lib/schemas/protocols'
import { formatTime } from '@/lib/shared/format'
import { ApproveForm } from './approve-form'
import { ProtocolRules } from './protocol-rules'

/** The unit's protocol for everyone to read: what is in force, what comes, what was; the draft for those who work on it. */
export function ProtocolPage({ page }: { page: ProtocolPageDto }) {
  const { unit, current, upcoming, past, draft, may } = page
  return (
    <>
      <PageHeading
        title="Protocol"
        below={`${unit.name}. In force now: ${describeOrigin(current, page)}`}
        aside={
          may.draft ? (
            <ButtonLink href={`/units/${unit.id}/protocol/edit`}>
              {draft ? 'Go on with the draft' : 'Draft a new version'}
            </ButtonLink>
          ) : null
        }
      />
      {current.isDefault ? (
        <Notice tone="wait" title="Product default" className="mb-8 max-w-reading">
          These values come with the product and are not yet approved by a physician of this unit. The unit lead drafts the unit’s
          own version, a physician approves it.
        </Notice>
      ) : null}
      {draft ? <Draft page={page} draft={draft} /> : null}
      {upcoming.map((version) => (
        <Folded
          key={version.id}
          version={version}
          page={page}
          title={`Version ${version.number}, from ${formatTime(version.startsAt ?? 0, unit.timeZone, page.nowMs)}`}
        />
      ))}
      <h2 className="mb-4 text-xl font-bold">Version {current.number}, in force</h2>
      <ProtocolRules version={current} />
      <h2 className="mb-2 mt-12 text-xl font-bold">Earlier versions</h2>
      {past.length === 0 ? (
        <p className="text-muted">None yet. Each version stays readable here; what was judged by it keeps its verdict.</p>
      ) : null}
      {past.map((version) => (
        <Folded key={version.id} version={version} page={page} title={`Version ${version.number}`} />
      ))}
    </>
  )
}

function describeOrigin(
  { number, isDefault, approvedByName, approvedAt, startsAt, note }: ProtocolVersionDto,
  { unit, nowMs }: ProtocolPageDto,
): string {
  const time = (ms: number) => formatTime(ms, unit.timeZone, nowMs)
  const since = startsAt === null ? '' : `, from ${time(startsAt)}`
  if (isDefault) return `version ${number}${since}.`
  return `version ${number}${since}, approved by ${approvedByName ?? 'a physician'} ${approvedAt === null ? '' : time(approvedAt)}. ${note}`
}

function Folded({ version, page, title }: { version: ProtocolVersionDto; page: ProtocolPageDto; title: string }) {
  return (
    <details className="border-t border-line py-1">
      <summary className="flex min-h-[44px] cursor-pointer items-center font-semibold underline underline-offset-4">
        {title}
      </summary>
      <p className="mb-4 text-muted">{describeOrigin(version, page)}</p>
      <ProtocolRules version={version} />
    </details>
  )
}

function Draft({ page, draft }: { page: ProtocolPageDto; draft: ProtocolVersionDto }) {
  const { unit, nowMs, may, approveRefusal } = page
  return (
    <section aria-labelledby="draft" className="mb-10 border-y border-ink py-5">
      <h2 id="draft" className="text-xl font-bold">
        Draft of version {draft.number}, not in force
      </h2>
      <p className="mb-3 text-muted">
        By {draft.draftedByName ?? 'the unit'}, {formatTime(draft.draftedAt, unit.timeZone, nowMs)}. {draft.note}
      </p>
      <details className="mb-4">
        <summary className="inline-flex min-h-[44px] cursor-pointer items-center font-semibold underline underline-offset-4">
          Read the draft
        </summary>
        <ProtocolRules version={draft} />
      </details>
      {may.approve ? (
        <ApproveForm unitId={unit.id} draft={{ id: draft.id, number: draft.number, version: draft.version }} day={page.day} />
      ) : null}
      {approveRefusal ? (
        <Notice tone="wait" title="Waiting for another physician">
          {approveRefusal}
        </Notice>
      ) : null}
      {!may.approve && !approveRefusal ? <p>A physician of this unit who did not draft it approves it.</p> : null}
    </section>
  )
}
