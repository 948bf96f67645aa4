import { clsx } from 'clsx';
import type { ReactNode } from 'react';
import { useOverflow } from '../lib/use-overflow.ts';

export interface Column<Row> {
  key: string;
  head: ReactNode;
  cell: (row: Row) => ReactNode;
  align?: 'start' | 'end';
  /** The cell that names its row. */
  isRowHead?: boolean;
  className?: string;
  /** Where this column can be sorted: how it is sorted now. */
  sorted?: 'ascending' | 'descending' | 'none';
}

/** A ruled table; it scrolls inside itself, never the page. */
export function Table<Row>(props: {
  caption: string;
  /** Caption is for screen readers only when a heading already says it. */
  captionHidden?: boolean;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  rowClass?: (row: Row) => string | undefined;
}) {
  const [box, scrolls] = useOverflow<HTMLDivElement>();
  return (
    <div
      ref={box}
      className="overflow-x-auto"
      {...(scrolls ? { role: 'region', 'aria-label': props.caption, tabIndex: 0 } : {})}
    >
      <table className="w-full border-collapse text-left">
        <caption
          className={props.captionHidden === false ? 'pb-2 text-left font-strong' : 'sr-only'}
        >
          {props.caption}
        </caption>
        <thead>
          <tr className="border-b-2 border-ink text-small text-soft">
            {props.columns.map((column) => (
              <th
                key={column.key}
                scope="col"
                aria-sort={column.sorted}
                className={clsx(
                  'py-2 pr-4 font-strong last:pr-0',
                  column.align === 'end' && 'text-right',
                  column.className,
                )}
              >
                {column.head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {props.rows.map((row) => (
            <tr key={props.rowKey(row)} className={clsx('ledger-line', props.rowClass?.(row))}>
              {props.columns.map((column) => {
                const Cell = column.isRowHead === true ? 'th' : 'td';
                return (
                  <Cell
                    key={column.key}
                    {...(column.isRowHead === true ? { scope: 'row' } : {})}
                    className={clsx(
                      'py-2.5 pr-4 align-top font-normal last:pr-0',
                      column.align === 'end' && 'text-right',
                      column.className,
                    )}
                  >
                    {column.cell(row)}
                  </Cell>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
