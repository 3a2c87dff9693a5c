import { DataTable, type Column } from '@/components/ui/data-table'
import { Tag } from '@/components/ui/tag'
import { clockTime } from '@/lib/client/wall-clock'
import type { EntryDto } from '@/lib/schemas/observed'
import type { LimitedReading } from '@/lib/weaning/published/hard-limits'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { SIGN_WORDS } from '@/lib/weaning/words'
import { NotObserved } from './not-observed'
import { readingLabel, readingText, readingUnit } from './reading-label'
import { unlikelyNames } from './unlikely-names'

type Row = EntryDto & { readings: ObservedReadings; minute?: number; opensEyesToVoice?: 'yes' | 'no' | null }

const NUMBERS = [
  'breathsPerMin',
  'tidalVolumeMl',
  'spo2Percent',
  'heartRatePerMin',
  'rass',
] as const satisfies readonly LimitedReading[]

type ObservationTableProps = { rows: readonly Row[]; caption: string; timeZone: string; nowMs: number }

/** Every observation, latest first. They are corrected from the patient's page, which knows what the reader may correct. */
export function ObservationTable({ rows, caption, timeZone, nowMs }: ObservationTableProps) {
  const hasMinute = rows.some((row) => row.minute !== undefined)
  const columns: Column<Row>[] = [
    {
      key: 'time',
      heading: 'Observed',
      cell: (row) => <span className="figure">{clockTime(row.observedAt, timeZone, nowMs)}</span>,
    },
    ...(hasMinute ? [{ key: 'minute', heading: 'Minute', isNumeric: true, cell: (row: Row) => row.minute ?? '' }] : []),
    ...NUMBERS.filter((reading) => rows.some((row) => row.readings[reading] !== null)).map((reading): Column<Row> => ({
      key: reading,
      heading: [readingLabel(reading), readingUnit(reading)].filter(Boolean).join(', '),
      isNumeric: true,
      cell: (row) => {
        const value = row.readings[reading]
        return value === null ? <NotObserved /> : readingText(reading, value)
      },
    })),
    {
      key: 'bp',
      heading: 'Blood pressure, mmHg',
      isNumeric: true,
      cell: (row) => bloodPressureText(row.readings) ?? <NotObserved />,
    },
    { key: 'signs', heading: 'Signs', cell: (row) => signsText(row) },
    { key: 'by', heading: 'Recorded by', cell: (row) => <RecordedBy row={row} timeZone={timeZone} nowMs={nowMs} /> },
  ]
  return (
    <DataTable
      caption={caption}
      columns={columns}
      rows={[...rows].reverse()}
      rowKey={(row) => row.id}
      empty="No observation yet."
    />
  )
}

/** "148/78", "148/not measured"; null when there is none. */
export function bloodPressureText(readings: Pick<ObservedReadings, 'systolicMmHg' | 'diastolicMmHg'>): string | null {
  const { systolicMmHg, diastolicMmHg } = readings
  if (systolicMmHg === null && diastolicMmHg === null) return null
  const part = (value: number | null) => (value === null ? 'not measured' : String(value))
  return `${part(systolicMmHg)}/${part(diastolicMmHg)}`
}

function signsText(row: Row): string {
  const signs = row.readings.signs.map((sign) => SIGN_WORDS[sign])
  const eyes =
    row.opensEyesToVoice === 'yes'
      ? ['opens eyes to voice']
      : row.opensEyesToVoice === 'no'
        ? ['does not open eyes to voice']
        : []
  return [...eyes, ...(signs.length > 0 ? signs : ['no sign marked'])].join(', ')
}

function RecordedBy({ row, timeZone, nowMs }: { row: Row; timeZone: string; nowMs: number }) {
  const unlikely = unlikelyNames(row.unlikely)
  return (
    <span className="flex flex-col">
      <span>{row.recordedByName}</span>
      {row.isLate ? (
        <Tag shape="late" tone="muted" className="text-sm">
          late entry, {clockTime(row.recordedAt, timeZone, nowMs)}
        </Tag>
      ) : null}
      {row.isAmended ? (
        <Tag shape="info" tone="ink" className="text-sm">
          corrected
        </Tag>
      ) : null}
      {unlikely.length > 0 ? (
        <Tag shape="late" tone="stop" className="text-sm">
          unusual: {unlikely.join(', ')}
        </Tag>
      ) : null}
    </span>
  )
}
