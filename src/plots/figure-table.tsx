import type { Figure } from '../../server/contract/figure.ts'
import { axisNumber } from './numbers.ts'

/** Rows beyond this would make the page slow; the file holds them all. */
const shownRows = 2000

/** Every number of the figure, as published in the file of results. */
export function FigureTable({ figure }: { figure: Figure }) {
  const { columns, rows } = figure.table
  const shown = rows.slice(0, shownRows)
  return (
    <div className="hs-plot-table" tabIndex={0} role="group" aria-label={`Data table of ${figure.title}`}>
      <table className="hs-table">
        <thead>
          <tr>
            {columns.map((column) => (
              <th key={column.name} scope="col" className="hs-right">
                {column.name}
                {column.unit && column.unit !== '1' ? ` / ${column.unit}` : ''}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {shown.map((row, at) => (
            <tr key={at}>
              {row.map((cell, each) => (
                <td key={each} className="hs-right hs-fig">
                  {cellText(cell)}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      {rows.length > shown.length && (
        <p className="hs-hint">
          The first {shownRows} of {rows.length} rows. The file of results holds them all.
        </p>
      )}
    </div>
  )
}

function cellText(cell: number | string | null): string {
  if (cell === null) return ''
  if (typeof cell === 'string') return cell
  return axisNumber(Number.isInteger(cell) ? String(cell) : String(Number(cell.toPrecision(7))))
}
