import type { ReactNode } from 'react'
import { classNames } from './class-names.ts'

export type Column<Row> = {
  head: ReactNode
  cell: (row: Row) => ReactNode
  /** Figures stand at the right, in the figure face. */
  figure?: boolean
  nowrap?: boolean
  /** This cell names its row. */
  heads?: boolean
  /** Left out on a phone. */
  deskOnly?: boolean
}

/** A table on paper; on a phone it scrolls inside the sheet, never the page, or stacks its rows into lines. */
export function Table<Row>({
  label,
  columns,
  rows,
  keyOf,
  selected,
  stackable,
  tight,
}: {
  label: string
  columns: Column<Row>[]
  rows: Row[]
  keyOf: (row: Row) => string
  selected?: string
  stackable?: boolean
  tight?: boolean
}) {
  return (
    <div className="hs-table-wells" tabIndex={stackable ? undefined : 0} role="group" aria-label={label}>
      <table className={classNames('hs-table', stackable && 'hs-table-stackable', tight && 'hs-table-tight')}>
        <thead>
          <tr>
            {columns.map((column, at) => (
              <th key={at} scope="col" className={cellClass(column, true)}>
                {column.head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={keyOf(row)} aria-selected={selected === keyOf(row) || undefined}>
              {columns.map((column, at) => (
                <Cell key={at} column={column} row={row} />
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}

function cellClass<Row>(column: Column<Row>, head: boolean): string | undefined {
  return (
    classNames(
      column.figure && 'hs-right',
      column.figure && !head && 'hs-fig',
      column.nowrap && 'hs-nowrap',
      column.deskOnly && 'hs-desk-only',
    ) || undefined
  )
}

function Cell<Row>({ column, row }: { column: Column<Row>; row: Row }) {
  const className = cellClass(column, false)
  return column.heads ? (
    <th scope="row" className={className}>
      {column.cell(row)}
    </th>
  ) : (
    <td className={className}>{column.cell(row)}</td>
  )
}
