'use client'

import type { FieldPath, FieldValues, UseFormReturn } from 'react-hook-form'
import { TextField } from '@/components/forms/text-field'
import { Notice } from '@/components/ui/notice'
import { clockTime } from '@/lib/client/wall-clock'
import type { EntryDto } from '@/lib/schemas/observed'

type AmendPanelProps<Values extends FieldValues, Context, Output> = {
  form: UseFormReturn<Values, Context, Output>
  /** The version that is corrected; nothing is drawn without one. */
  entry: EntryDto | null
  timeZone: string
  nowMs: number
}

/** Says which version is being corrected, and asks why. */
export function AmendPanel<Values extends FieldValues, Context, Output>({
  form,
  entry,
  timeZone,
  nowMs,
}: AmendPanelProps<Values, Context, Output>) {
  if (entry === null) return null
  return (
    <div className="mb-6 flex flex-col gap-3">
      <Notice tone="info" title="Correction">
        You correct version {entry.entryVersion}, observed {clockTime(entry.observedAt, timeZone, nowMs)}, recorded by{' '}
        {entry.recordedByName}. It stays readable below the new version.
      </Notice>
      <TextField
        control={form.control}
        name={'amends.reason' as FieldPath<Values>}
        label="Why it is corrected"
        width={48}
        maxLength={500}
      />
    </div>
  )
}
