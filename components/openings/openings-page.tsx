import { DataTable } from '@/components/ui/data-table'
import { PageHeading } from '@/components/ui/page-heading'
import { Tag } from '@/components/ui/tag'
import type { OpeningDto, OpeningListDto } from '@/lib/schemas/openings'
import { formatTime } from '@/lib/shared/format'

/** For the unit lead: who from outside the unit opened which record, and the reason given. */
export function OpeningsPage({ list }: { list: OpeningListDto }) {
  const { unit, nowMs, openings } = list
  const time = (ms: number) => formatTime(ms, unit.timeZone, nowMs)
  return (
    <>
      <PageHeading
        title="Opened from outside"
        below={`${unit.name}. Someone outside the unit can open one patient’s record for 8 hours by giving a reason.`}
      />
      <DataTable<OpeningDto>
        caption="Records opened from outside the unit"
        isCaptionHidden
        rows={openings}
        rowKey={({ id }) => id}
        empty="Nobody from outside has opened a record of this unit."
        columns={[
          { key: 'when', heading: 'Opened', cell: ({ openedAt }) => <span className="figure">{time(openedAt)}</span> },
          { key: 'who', heading: 'By', cell: ({ personName }) => personName },
          {
            key: 'patient',
            heading: 'Patient',
            cell: ({ familyName, givenName, recordNumber }) => `${familyName}, ${givenName} (${recordNumber})`,
          },
          { key: 'reason', heading: 'Reason given', cell: ({ reason }) => reason },
          {
            key: 'state',
            heading: 'State',
            cell: ({ isOpen, expiresAt }) =>
              isOpen ? (
                <Tag shape="ring" tone="wait">
                  open until {time(expiresAt)}
                </Tag>
              ) : (
                <Tag shape="tick" tone="muted">
                  closed
                </Tag>
              ),
          },
        ]}
      />
    </>
  )
}
