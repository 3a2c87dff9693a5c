'use client'

import Link from 'next/link'
import { useLive } from '@/components/episodes/use-live'
import { ButtonLink } from '@/components/ui/button'
import { DataTable, type Column } from '@/components/ui/data-table'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import { Tag } from '@/components/ui/tag'
import { patientKeys } from '@/lib/client/keys/patients'
import { clockTime } from '@/lib/client/wall-clock'
import type { PatientListDto, UnitPatientDto } from '@/lib/schemas/patients'
import { SEX_WORDS } from '@/lib/weaning/words'

/** Everybody in the unit, ventilated or not, in bed order, with the free beds. */
export function UnitPatients({ initial, mayBegin }: { initial: PatientListDto; mayBegin: boolean }) {
  const { unit } = initial
  const { data, isStale } = useLive(patientKeys.unit(unit.id), `/api/units/${unit.id}/patients`, initial)
  const ventilated = data.patients.filter(({ episode }) => episode !== null).length
  const columns: Column<UnitPatientDto>[] = [
    { key: 'bed', heading: 'Bed', cell: ({ bedLabel }) => <span className="figure text-lg">{bedLabel}</span> },
    {
      key: 'name',
      heading: 'Patient',
      cell: (each) => (
        <Link
          href={`/patients/${each.patientId}`}
          prefetch={false}
          className="-my-2.5 inline-flex min-h-[44px] items-center font-semibold"
        >
          {each.familyName}, {each.givenName}
        </Link>
      ),
    },
    {
      key: 'who',
      heading: 'Sex, age',
      cell: ({ sex, ageYears }) =>
        `${sex === null ? 'sex not recorded' : SEX_WORDS[sex]}, ${ageYears === null ? 'age not known' : `${ageYears} years`}`,
    },
    { key: 'number', heading: 'Record number', cell: ({ recordNumber }) => <span className="figure">{recordNumber}</span> },
    { key: 'state', heading: 'Ventilation', cell: (each) => <Ventilation patient={each} list={data} mayBegin={mayBegin} /> },
  ]
  return (
    <>
      <PageHeading
        title="Patients"
        below={`${unit.name}: ${data.patients.length} in the unit, ${ventilated} ventilated, ${data.freeBeds.length} ${data.freeBeds.length === 1 ? 'bed' : 'beds'} free`}
        aside={
          <div className="flex flex-wrap gap-3">
            {data.mayAdmit ? (
              <ButtonLink href={`/units/${unit.id}/patients/admit`} variant="primary">
                Admit a patient
              </ButtonLink>
            ) : null}
            <ButtonLink href={`/units/${unit.id}/patients/open`}>Open a record of another unit</ButtonLink>
          </div>
        }
      />
      {isStale ? (
        <Notice tone="stop" title="No answer from the server" role="status" className="mb-4">
          What stands here may be out of date.
        </Notice>
      ) : null}
      <DataTable
        caption={`Patients in ${unit.name}`}
        isCaptionHidden
        columns={columns}
        rows={data.patients}
        rowKey={({ patientId }) => patientId}
        empty={
          data.mayAdmit
            ? 'Nobody is in this unit. Begin by admitting a patient to a bed.'
            : 'Nobody is in this unit. An RT, a nurse or a physician of the unit admits the first patient.'
        }
      />
      {data.freeBeds.length > 0 ? (
        <p className="mt-4 text-muted">
          Free: <span className="figure">{data.freeBeds.map(({ label }) => label).join(', ')}</span>
        </p>
      ) : null}
    </>
  )
}

function Ventilation({ patient, list, mayBegin }: { patient: UnitPatientDto; list: PatientListDto; mayBegin: boolean }) {
  const { episode, lastEndedAt } = patient
  if (episode)
    return (
      <Tag shape="dot" tone="ink">
        ventilator day {episode.ventilatorDayNumber}
      </Tag>
    )
  return (
    <span className="flex flex-wrap items-center gap-x-3">
      <span className="text-muted">
        {lastEndedAt === null ? 'not ventilated' : `ended ${clockTime(lastEndedAt, list.unit.timeZone, list.nowMs)}`}
      </span>
      {mayBegin ? (
        <Link
          href={`/patients/${patient.patientId}/begin`}
          prefetch={false}
          className="-my-2.5 inline-flex min-h-[44px] items-center"
        >
          Begin ventilation
        </Link>
      ) : null}
    </span>
  )
}
