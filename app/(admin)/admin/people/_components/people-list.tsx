'use client'

import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { DataTable, type Column } from '@/components/ui/data-table'
import { Dialog } from '@/components/ui/dialog'
import { PageHeading } from '@/components/ui/page-heading'
import { Tag } from '@/components/ui/tag'
import { apiGet } from '@/lib/client/api'
import { adminKeys } from '@/lib/client/keys/admin'
import type { PeopleDto, PersonDto } from '@/lib/schemas/people'
import { ROLE_WORDS } from '@/lib/weaning/words'
import { InviteForm } from './invite-form'
import { PersonDialog } from './person-dialog'

/** Everybody with an account in the hospital, and what each may do where. */
export function PeopleList({ initial }: { initial: PeopleDto }) {
  const { data } = useQuery({
    queryKey: adminKeys.people(),
    queryFn: ({ signal }) => apiGet<PeopleDto>('/api/admin/people', { signal }),
    initialData: initial,
  })
  const [isInviting, setInviting] = useState(false)
  const [openId, setOpenId] = useState<string | null>(null)
  const [message, setMessage] = useState('')
  const open = data.people.find((person) => person.id === openId) ?? null

  const finish = (text: string) => {
    setInviting(false)
    setOpenId(null)
    setMessage(text)
  }

  return (
    <>
      <PageHeading
        title="People"
        below="Who has an account, and which roles they hold in which unit. Changes hold from the person’s next step on."
        aside={
          <Button variant="primary" onClick={() => setInviting(true)}>
            Invite a person
          </Button>
        }
      />
      <p role="status" className="mb-4 font-semibold text-calm">
        {message}
      </p>
      <DataTable
        caption="People with an account"
        isCaptionHidden
        columns={columns((person) => {
          setMessage('')
          setOpenId(person.id)
        })}
        rows={data.people}
        rowKey={(person) => person.id}
        empty="Nobody has an account yet."
      />
      <Dialog isOpen={isInviting} title="Invite a person" onClose={() => setInviting(false)} closeLabel="Close without inviting">
        <InviteForm
          units={data.units}
          onInvited={(person) => finish(`Invitation for ${person.name} is on its way to ${person.email}.`)}
        />
      </Dialog>
      <PersonDialog
        key={open ? `${open.id}-${open.version}` : 'none'}
        person={open}
        units={data.units}
        onClose={() => setOpenId(null)}
        onDone={finish}
      />
    </>
  )
}

function columns(onChange: (person: PersonDto) => void): Column<PersonDto>[] {
  return [
    { key: 'name', heading: 'Name', cell: (person) => <NameCell person={person} onChange={() => onChange(person)} /> },
    { key: 'roles', heading: 'Roles', cell: (person) => <Roles person={person} /> },
    { key: 'state', heading: 'Account', cell: (person) => <State person={person} /> },
  ]
}

function NameCell({ person, onChange }: { person: PersonDto; onChange: () => void }) {
  return (
    <>
      <Button variant="quiet" className="-mt-2.5 -ml-3 text-left" aria-label={`Change ${person.name}`} onClick={onChange}>
        {person.name}
      </Button>
      <span className="block font-normal break-all text-muted">{person.email}</span>
    </>
  )
}

function Roles({ person }: { person: PersonDto }) {
  const units = [...new Set(person.memberships.map((held) => held.unitName))]
  const lines = units.map((unit) => {
    const roles = person.memberships.filter((held) => held.unitName === unit).map((held) => ROLE_WORDS[held.role])
    return `${unit}: ${roles.join(', ')}`
  })
  if (person.isAdministrator) lines.push('Administrator')
  if (lines.length === 0) return <span className="text-muted">none</span>
  return lines.map((line) => (
    <span key={line} className="block">
      {line}
    </span>
  ))
}

const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone: 'UTC' })

function State({ person }: { person: PersonDto }) {
  if (person.state === 'active')
    return (
      <Tag shape="tick" tone="calm">
        Active
      </Tag>
    )
  if (person.state === 'deactivated')
    return (
      <Tag shape="dash" tone="muted">
        Deactivated
      </Tag>
    )
  if (person.invitationExpiresAt === null)
    return (
      <Tag shape="late" tone="stop">
        Invitation has run out
      </Tag>
    )
  return (
    <Tag shape="ring" tone="wait">
      Invited, link valid until {day.format(person.invitationExpiresAt)}
    </Tag>
  )
}
