import type { ReactNode } from 'react'
import { Notice } from '@/components/ui/notice'
import { PageHeading } from '@/components/ui/page-heading'
import type { StepFormDto } from '@/lib/schemas/step-form'
import { PatientLine } from './patient-line'

type StepPageProps = {
  title: string
  form: Pick<StepFormDto, 'patient' | 'protocol'>
  below?: ReactNode
  aside?: ReactNode
  isStale?: boolean
  children: ReactNode
}

/** The frame of every step's page: whom it is about, what it is, and by which protocol version it is judged. */
export function StepPage({ title, form, below, aside, isStale = false, children }: StepPageProps) {
  return (
    <>
      <PageHeading title={title} above={<PatientLine patient={form.patient} />} below={below} aside={aside} />
      {isStale ? (
        <Notice tone="stop" title="No answer from the server" role="status" className="mb-6">
          What stands here may be out of date. It is tried again every few seconds; what you typed is still here.
        </Notice>
      ) : null}
      {children}
      <p className="mt-8 text-sm text-muted">
        Limits: unit protocol version {form.protocol.number}
        {form.protocol.isDefault ? ', product default, not yet approved by a physician of this unit' : ''}.
      </p>
    </>
  )
}
