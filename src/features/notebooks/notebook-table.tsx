import type { Notebook } from '../../../server/contract/notebooks.ts'
import { longDate } from '../../lib/times.ts'
import { TextLink } from '../../ui/button.tsx'
import { Table } from '../../ui/table.tsx'

interface NotebookTableProps {
  notebooks: Notebook[]
  personId: string
  pathOf: (id: string) => string
}

/** Notebooks the person may read. */
export function NotebookTable({ notebooks, personId, pathOf }: NotebookTableProps) {
  const roleIn = (notebook: Notebook) =>
    notebook.members.find((member) => member.personId === personId)?.role ?? 'reads'
  return (
    <Table
      label="Notebooks"
      rows={notebooks}
      keyOf={(notebook) => notebook.id}
      stackable
      columns={[
        {
          head: 'Number',
          nowrap: true,
          cell: (notebook) => <span className="hs-fig">{notebook.number}</span>,
        },
        {
          head: 'Title',
          heads: true,
          cell: (notebook) => <TextLink to={pathOf(notebook.id)}>{notebook.title}</TextLink>,
        },
        { head: 'Sheets', figure: true, cell: (notebook) => notebook.entries },
        { head: 'You', nowrap: true, cell: roleIn },
        {
          head: 'Kept by',
          deskOnly: true,
          cell: (notebook) => notebook.members.find((member) => member.keeper)?.name ?? '',
        },
        { head: 'Begun', deskOnly: true, nowrap: true, cell: (notebook) => longDate(notebook.createdAt) },
      ]}
    />
  )
}
