'use client'

import { Dialog } from '@/components/ui/dialog'
import type { PeopleDto, PersonDto } from '@/lib/schemas/people'
import { DeactivateForm } from './deactivate-form'
import { ReinviteForm } from './reinvite-form'
import { RolesForm } from './roles-form'

type PersonDialogProps = {
  person: PersonDto | null
  units: PeopleDto['units']
  onClose: () => void
  onDone: (message: string) => void
}

/** What an administrator can do about one person: roles, a new invitation, deactivation. */
export function PersonDialog({ person, units, onClose, onDone }: PersonDialogProps) {
  return (
    <Dialog isOpen={person !== null} title={person?.name ?? ''} onClose={onClose} closeLabel="Close without changing">
      {person ? (
        <div className="flex flex-col gap-8">
          <p className="break-all text-muted">{person.email}</p>
          {person.state === 'deactivated' ? null : (
            <RolesForm person={person} units={units} onDone={() => onDone(`Roles of ${person.name} are changed.`)} />
          )}
          {person.state === 'active' ? null : (
            <ReinviteForm
              person={person}
              onDone={() => onDone(`A new invitation for ${person.name} is on its way to ${person.email}.`)}
            />
          )}
          {person.state === 'deactivated' ? null : (
            <DeactivateForm person={person} onDone={() => onDone(`${person.name} is deactivated and signed out everywhere.`)} />
          )}
        </div>
      ) : null}
    </Dialog>
  )
}
