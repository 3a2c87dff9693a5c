import type { ReactNode } from 'react'
import { cn } from '@/lib/shared/cn'

export type Column<Row> = {
  key: string
  heading: string
  cell: (row: Row) => ReactNode
  /** Numbers stand to the right in the tabular face. */
  isNumeric?: boolean
}

type DataTableProps<Row> = {
  caption: string
  isCaptionHidden?: boolean
  columns: readonly Column<Row>[]
  rows: readonly Row[]
  rowKey: (row: Row) => string
  /** What stands there when there are no rows yet. */
  empty: ReactNode
}

/** A plain table. The first column names the row. Wide tables scroll inside their own frame, never the page. */
export function DataTable<Row>({ caption, isCaptionHidden, columns, rows, rowKey, empty }: DataTableProps<Row>) {
  if (rows.length === 0) return <div className="py-6 text-muted">{empty}</div>
  return (
    <div role="region" aria-label={caption} tabIndex={0} className="relative overflow-x-auto">
      <table className="w-full border-collapse text-left">
        <caption className={cn('pb-2 text-left font-semibold', isCaptionHidden && 'sr-only')}>{caption}</caption>
        <thead>
          <tr className="border-b border-line text-sm text-muted">
            {columns.map((column) => (
              <th
                key={column.key}
                scope="col"
                className={cn('py-2 pr-6 font-normal last:pr-0', column.isNumeric && 'text-right')}
              >
                {column.heading}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={rowKey(row)} className="border-b border-line align-top">
              {columns.map((column, index) => {
                const look = cn('py-2.5 pr-6 last:pr-0', column.isNumeric && 'figure text-right whitespace-nowrap')
                return index === 0 ? (
                  <th key={column.key} scope="row" className={cn(look, 'font-semibold')}>
                    {column.cell(row)}
                  </th>
                ) : (
                  <td key={column.key} className={look}>
                    {column.cell(row)}
                  </td>
                )
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  )
}
