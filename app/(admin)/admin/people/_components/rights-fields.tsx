'use client'

import { useWatch, type Control } from 'react-hook-form'
import { CheckField, Toggle } from '@/components/forms/check-field'
import { FieldError, GroupFrame } from '@/components/forms/field-frame'
import { useField, useFieldIds } from '@/components/forms/use-field'
import { CLINICAL_ROLES, type ClinicalRole } from '@/lib/weaning/vocabulary'
import { ROLE_WORDS } from '@/lib/weaning/words'

type Rights = { isAdministrator: boolean; memberships: { unitId: string; role: ClinicalRole }[] }
type RightsFieldsProps<Values extends Rights, Context, Output> = {
  control: Control<Values, Context, Output>
  units: readonly { id: string; name: string }[]
}

/** Roles in each unit, and whether the person administers the hospital. The form holds `memberships` and `isAdministrator`. */
export function RightsFields<Values extends Rights, Context, Output>({
  control,
  units,
}: RightsFieldsProps<Values, Context, Output>) {
  // The names below exist in every form that extends Rights; the form library cannot see that through the type parameter.
  const own = control as unknown as Control<Rights>
  const { ids, error, register, change } = useField({ control: own, name: 'memberships' })
  const held = useWatch({ control: own, name: 'memberships' })

  const toggle = (unitId: string, role: ClinicalRole, isOn: boolean) => {
    const others = held.filter((one) => one.unitId !== unitId || one.role !== role)
    change(isOn ? [...others, { unitId, role }] : others)
  }

  return (
    <div className="flex flex-col gap-4">
      {units.length === 0 ? (
        <p className="text-muted">There is no unit yet, so no role in one can be given. Add a unit first.</p>
      ) : null}
      {units.map((unit, at) => (
        <UnitRoles
          key={unit.id}
          name={unit.name}
          held={held.filter((one) => one.unitId === unit.id).map((one) => one.role)}
          firstRef={at === 0 ? register : undefined}
          invalid={Boolean(error)}
          describedBy={error ? ids.error : undefined}
          onToggle={(role, isOn) => toggle(unit.id, role, isOn)}
        />
      ))}
      <FieldError id={ids.error} message={error} />
      <CheckField
        control={own}
        name="isAdministrator"
        label="Administrator: people, units and sign-in rules. Gives no sight of patients."
      />
    </div>
  )
}

type UnitRolesProps = {
  name: string
  held: readonly ClinicalRole[]
  firstRef: ((element: HTMLInputElement | null) => void) | undefined
  invalid: boolean
  describedBy: string | undefined
  onToggle: (role: ClinicalRole, isOn: boolean) => void
}

function UnitRoles({ name, held, firstRef, invalid, describedBy, onToggle }: UnitRolesProps) {
  const ids = useFieldIds()
  return (
    <GroupFrame role="group" ids={ids} label={name} error={undefined}>
      {CLINICAL_ROLES.map((role, at) => (
        <Toggle
          key={role}
          label={ROLE_WORDS[role]}
          isOn={held.includes(role)}
          inputRef={at === 0 ? firstRef : undefined}
          invalid={invalid}
          describedBy={describedBy}
          onToggle={(isOn) => onToggle(role, isOn)}
        />
      ))}
    </GroupFrame>
  )
}
