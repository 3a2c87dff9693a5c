'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { NumberField } from '@/components/forms/number-field'
import { SelectField } from '@/components/forms/select-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextField } from '@/components/forms/text-field'
import { useSubmit } from '@/components/forms/use-submit'
import { adminKeys } from '@/lib/client/keys/admin'
import { createUnitSchema, updateUnitSchema, type UnitAdminDto } from '@/lib/schemas/units'
import { BedLabelsField } from './bed-labels-field'

/** A new unit, or the settings of one that exists. */
export function UnitForm({ unit, onDone }: { unit: UnitAdminDto | null; onDone: (unit: UnitAdminDto) => void }) {
  return unit === null ? <CreateUnitForm onDone={onDone} /> : <ChangeUnitForm unit={unit} onDone={onDone} />
}

function CreateUnitForm({ onDone }: { onDone: (unit: UnitAdminDto) => void }) {
  const form = useForm({
    resolver: zodResolver(createUnitSchema),
    defaultValues: { name: '', timeZone: ownTimeZone(), barometricPressureMmHg: null, bedLabels: [] },
  })
  const submit = useSubmit({ form, path: '/api/admin/units', invalidates: [adminKeys.root], onRecorded: onDone })
  return (
    <Form submit={submit} label="Add a unit" className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <TextField control={form.control} name="name" label="Name" maxLength={80} />
      <SelectField
        control={form.control}
        name="timeZone"
        label="Time zone"
        options={timeZones()}
        hint="Fixed once the unit has had a patient."
      />
      <NumberField control={form.control} name="altitudeM" label="Altitude" unit="m" isSigned hint={ALTITUDE_HINT} />
      <NumberField
        control={form.control}
        name="barometricPressureMmHg"
        label="Barometer reading"
        unit="mmHg"
        hint={BAROMETER_HINT}
      />
      <BedLabelsField control={form.control} />
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Adding…">
          Add unit
        </SubmitButton>
      </div>
    </Form>
  )
}

function ChangeUnitForm({ unit, onDone }: { unit: UnitAdminDto; onDone: (unit: UnitAdminDto) => void }) {
  const { id, beds: _beds, ...values } = unit
  const form = useForm({ resolver: zodResolver(updateUnitSchema), defaultValues: { unitId: id, ...values } })
  const submit = useSubmit({ form, path: `/api/admin/units/${id}`, invalidates: [adminKeys.root], onRecorded: onDone })
  return (
    <Form submit={submit} label={`Change ${unit.name}`} className="flex flex-col gap-5">
      <FormErrorSummary control={form.control} submit={submit} />
      <TextField control={form.control} name="name" label="Name" maxLength={80} />
      <SelectField
        control={form.control}
        name="timeZone"
        label="Time zone"
        options={timeZones(unit.timeZone)}
        hint="Fixed once the unit has had a patient."
      />
      <NumberField control={form.control} name="altitudeM" label="Altitude" unit="m" isSigned hint={ALTITUDE_HINT} />
      <NumberField
        control={form.control}
        name="barometricPressureMmHg"
        label="Barometer reading"
        unit="mmHg"
        hint={BAROMETER_HINT}
      />
      <div className="flex flex-wrap gap-5">
        <NumberField control={form.control} name="dayTrackFromHour" label="Day track from" unit="o’clock" digits={3} isWhole />
        <NumberField control={form.control} name="dayTrackToHour" label="Day track to" unit="o’clock" digits={3} isWhole />
      </div>
      <div>
        <SubmitButton isSending={submit.isSending} sendingLabel="Saving…">
          Save
        </SubmitButton>
      </div>
    </Form>
  )
}

const ALTITUDE_HINT = 'Above sea level; 0 at the coast. Oxygen indices are corrected by it.'
const BAROMETER_HINT = 'Only if measured here; it wins over the altitude. Station pressure, not reduced to sea level.'

function ownTimeZone(): string {
  return new Intl.DateTimeFormat().resolvedOptions().timeZone
}

/** Every zone that the browser knows, with the present one even if the browser calls it otherwise. */
function timeZones(present = ownTimeZone()): { value: string; label: string }[] {
  const names = new Set([...Intl.supportedValuesOf('timeZone'), 'UTC', present])
  return [...names].sort().map((name) => ({ value: name, label: name.replaceAll('_', ' ') }))
}
