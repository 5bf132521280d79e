import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { Role } from '../../../server/contract/common.ts'
import type { Notebook } from '../../../server/contract/notebooks.ts'
import { sentenceOf } from '../../lib/api-problem.ts'
import { Button } from '../../ui/button.tsx'
import { Message } from '../../ui/message.tsx'
import { Select } from '../../ui/select.tsx'
import { useSetMember } from './mutations.ts'
import { peopleQuery } from './queries.ts'

const rights: Record<Role, string> = {
  experimentalist: 'writes and signs',
  supervisor: 'writes, and witnesses what others wrote',
  auditor: 'reads and exports',
  manager: 'reads',
}

/** Adds a person of the laboratory, only in a role that the person holds there. */
export function AddMember({ notebook }: { notebook: Notebook }) {
  const { data: people } = useQuery(peopleQuery)
  const [open, setOpen] = useState(false)
  const [personId, setPersonId] = useState<string | null>(null)
  const [role, setRole] = useState<Role | null>(null)
  const setMember = useSetMember(notebook.id)
  const strangers = (people?.items ?? []).filter(
    (person) => person.active && !notebook.members.some((member) => member.personId === person.id),
  )
  const roles = strangers.find((person) => person.id === personId)?.roles ?? []

  if (!open) {
    return (
      <Button size="small" icon="plus" onClick={() => setOpen(true)}>
        Add a person
      </Button>
    )
  }

  function choosePerson(id: string) {
    setPersonId(id)
    setRole(strangers.find((person) => person.id === id)?.roles[0] ?? null)
  }

  function add() {
    if (personId === null || role === null) return
    setMember.mutate({ personId, role }, { onSuccess: () => setOpen(false) })
  }

  return (
    <div className="hs-form">
      <Select
        label="Person"
        choices={strangers.map((person) => ({
          value: person.id,
          label: person.name,
          note: person.roles.join(', '),
        }))}
        value={personId}
        onChange={choosePerson}
      />
      <Select
        label="Role in this notebook"
        choices={roles.map((each) => ({ value: each, label: each, note: rights[each] }))}
        value={role}
        onChange={setRole}
        disabled={personId === null}
      />
      {setMember.isError && <Message kind="fault">{sentenceOf(setMember.error)}</Message>}
      <div className="hs-actions">
        <Button size="small" kind="primary" busy={setMember.isPending} onClick={add}>
          Add
        </Button>
        <Button size="small" onClick={() => setOpen(false)}>
          Do not add
        </Button>
      </div>
    </div>
  )
}
