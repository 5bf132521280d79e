import type { ReactNode } from 'react'
import type { Person } from '../../../../server/contract/people.ts'
import { Initials } from '../../../ui/initials.tsx'
import { StateGlyph, type StateName } from '../../../ui/state-glyph.tsx'
import { Table, type Column } from '../../../ui/table.tsx'

/** People with their roles and how their signing key stands; the page says what can be done about a key. */
export function PeopleTable({
  people,
  standing,
  act,
}: {
  people: Person[]
  standing: Record<Person['signingKey'], { state: StateName; words: string }>
  act: (person: Person) => ReactNode
}) {
  const columns: Column<Person>[] = [
    {
      head: 'Name',
      heads: true,
      cell: (person) => (
        <span className="flex items-center gap-2.5">
          <Initials name={person.name} />
          {person.name}
          {!person.active && <span className="hs-quiet font-normal"> ended</span>}
        </span>
      ),
    },
    { head: 'Login', cell: (person) => <span className="hs-fig">{person.login}</span>, deskOnly: true },
    { head: 'Roles', cell: (person) => person.roles.join(', ') || 'none' },
    {
      head: 'Signing key',
      cell: (person) => {
        const { state, words } = standing[person.signingKey]
        return <StateGlyph state={state}>{words}</StateGlyph>
      },
      nowrap: true,
    },
    { head: <span className="hs-only-spoken">Act</span>, cell: act },
  ]
  return (
    <Table
      label="People of the laboratory"
      columns={columns}
      rows={people}
      keyOf={(person) => person.id}
      stackable
    />
  )
}
