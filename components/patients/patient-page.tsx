'use client'

import { axisHours, percentAt } from '@/components/day-track/axis'
import { DayTrack, TRACK_GUTTER } from '@/components/day-track/day-track'
import { AdultsOnly } from '@/components/episodes/adults-only'
import { NextMoveLine } from '@/components/episodes/next-move-line'
import { describePatient } from '@/components/episodes/patient-line'
import { useLive } from '@/components/episodes/use-live'
import { useServerNow } from '@/components/episodes/use-server-now'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { STEP_ACTIONS } from '@/lib/access/policy'
import { patientKeys } from '@/lib/client/keys/patients'
import { clockTime } from '@/lib/client/wall-clock'
import type { PatientPageDto } from '@/lib/schemas/patient-page'
import { UNKNOWN_WORDS } from '@/lib/weaning/words'
import { DaySection } from './day-section'
import { EpisodeList } from './episode-list'
import { LatestValues } from './latest-values'
import { PatientActions } from './patient-actions'

/** One patient: whose move it is, today's track, latest values, every ventilator day, and what the reader may record. */
export function PatientPage({ initial }: { initial: PatientPageDto }) {
  const {
    patient: { id },
  } = initial
  const { data: page, isStale } = useLive(patientKeys.page(id), `/api/patients/${id}`, initial, !initial.isOpening)
  const nowMs = useServerNow(page.nowMs)
  const { patient, unit, stay, episode, move } = page
  const pbw = page.predictedBodyWeightKg
  const line = describePatient({
    ...patient,
    predictedBodyWeightKg: pbw.known ? pbw.value : null,
    ventilatorDayNumber: page.ventilatorDayNumber,
  })
  const mayMove = move?.kind === 'move' && page.may[STEP_ACTIONS[move.step]] === true
  return (
    <div className="flex flex-col gap-8">
      <PageHeading
        title={`${patient.familyName}, ${patient.givenName}`}
        above={
          <span className="figure text-xl font-semibold text-ink">
            {stay.endedAt === null ? stay.bedLabel : `left ${stay.bedLabel}`}
          </span>
        }
        below={
          <>
            <p>{line}</p>
            <p>
              Record number <span className="figure">{patient.recordNumber}</span>
              {patient.weightKg === null ? '' : ` · weight ${patient.weightKg} kg`}
            </p>
            {pbw.known ? null : <p>PBW {pbw.reason === 'missing' ? 'needs sex and height' : UNKNOWN_WORDS[pbw.reason]}</p>}
            {page.isHeightOutsideRange ? (
              <p className="font-semibold text-stop">Height below 140 cm: PBW is outside the range of its formula</p>
            ) : null}
          </>
        }
        aside={
          move ? <NextMoveLine move={move} href={mayMove ? page.moveHref : null} timeZone={unit.timeZone} nowMs={nowMs} /> : null
        }
      />
      {isStale ? (
        <Notice tone="stop" title="No answer from the server" role="status">
          What stands here may be out of date. It is tried again every few seconds.
        </Notice>
      ) : null}
      {page.isOpening ? (
        <Notice tone="wait" title="Opened from outside the unit">
          You read this record for the reason you gave
          {page.openUntil === null ? '' : `, until ${clockTime(page.openUntil, unit.timeZone, nowMs)}`}. Every reading is logged,
          and the unit lead was told. Nothing can be recorded; the page does not refresh itself.
        </Notice>
      ) : null}
      {episode ? (
        <AdultsOnly isAdult={patient.isAdult} patientId={patient.id} mayCorrect={page.may['patient.correct'] === true} />
      ) : null}
      <PatientActions page={page} />
      {episode ? (
        <TodayTrack page={page} nowMs={nowMs} />
      ) : (
        <Notice tone="info" title="Not ventilated">
          No episode of ventilation is recorded for this patient.
        </Notice>
      )}
      {episode ? (
        <section aria-labelledby="latest">
          <h2 id="latest" className="mb-3 text-xl font-bold">
            Latest values
          </h2>
          <LatestValues page={page} nowMs={nowMs} />
        </section>
      ) : null}
      {episode ? (
        <section aria-labelledby="days">
          <h2 id="days" className="mb-3 text-xl font-bold">
            Day by day
          </h2>
          {page.days.length === 0 ? (
            <p className="text-muted">
              Nothing is recorded yet. Settings, screen, hold, trial and decision will stand here, newest day first.
            </p>
          ) : null}
          {page.days.map((day, index) => (
            <DaySection
              key={day.day}
              day={day}
              all={page.days}
              episodeId={episode.id}
              timeZone={unit.timeZone}
              nowMs={nowMs}
              isOpen={index === 0}
            />
          ))}
        </section>
      ) : null}
      <EpisodeList page={page} nowMs={nowMs} />
    </div>
  )
}

function TodayTrack({ page, nowMs }: { page: PatientPageDto; nowMs: number }) {
  const axis = { fromMs: page.trackFromMs, toMs: page.trackToMs }
  const { timeZone } = page.unit
  return (
    <section aria-label="Today">
      <h2 className="mb-1 text-xl font-bold">Today</h2>
      <div aria-hidden="true" style={{ paddingInline: TRACK_GUTTER }}>
        <div className="relative h-5 text-sm text-muted">
          {axisHours(axis, timeZone).map(({ ms, label }) => (
            <span key={ms} className="figure absolute -translate-x-1/2" style={{ left: `${percentAt(axis, ms)}%` }}>
              {label}
            </span>
          ))}
        </div>
      </div>
      <DayTrack track={page.track} axis={axis} nowMs={nowMs} timeZone={timeZone} />
    </section>
  )
}
