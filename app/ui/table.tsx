import type { ReactNode } from 'react';
import { classNames } from './class-names.ts';

export interface Column<Row> {
  readonly id: string;
  readonly head: ReactNode;
  readonly cell: (row: Row) => ReactNode;
  /** Figures stand right, one under the other. */
  readonly isFigure?: boolean;
  /** Instead of `head` before the cell on a phone. */
  readonly foldHead?: string;
  readonly className?: string;
}

export interface TableProps<Row> {
  /** What the table shows; only heard where `showCaption` is not set. */
  readonly caption: string;
  readonly showCaption?: boolean;
  readonly columns: readonly Column<Row>[];
  readonly rows: readonly Row[];
  readonly rowKey: (row: Row) => string;
  /** selected: has the stroke. left: no longer takes part. */
  readonly rowState?: (row: Row) => 'selected' | 'left' | undefined;
  /** On a phone each row becomes a small entry with its heads beside; off for tables of two or three short columns. */
  readonly isFolding?: boolean;
  readonly empty?: ReactNode;
}

/** A ruled table; the first column names the row. */
export function Table<Row>(props: TableProps<Row>) {
  const { caption, showCaption, columns, rows, rowKey, rowState, isFolding = true, empty } = props;
  if (rows.length === 0 && empty) return <>{empty}</>;
  return (
    <table className={classNames('table', isFolding && 'fold')}>
      <caption className={showCaption ? 'flabel' : 'sr-only'}>{caption}</caption>
      <thead>
        <tr>
          {columns.map((column) => (
            <th
              key={column.id}
              scope="col"
              className={classNames(column.isFigure && 'n', column.className) || undefined}
            >
              {column.head}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <TableRow key={rowKey(row)} row={row} columns={columns} state={rowState?.(row)} />
        ))}
      </tbody>
    </table>
  );
}

function TableRow<Row>({
  row,
  columns,
  state,
}: {
  row: Row;
  columns: readonly Column<Row>[];
  state?: 'selected' | 'left';
}) {
  return (
    <tr aria-selected={state === 'selected' || undefined} className={state === 'left' ? 'left' : undefined}>
      {columns.map((column, index) => {
        const className = classNames(column.isFigure && 'n', column.className) || undefined;
        const foldHead = column.foldHead ?? (typeof column.head === 'string' ? column.head : undefined);
        return index === 0 ? (
          <th key={column.id} scope="row" className={className}>
            {column.cell(row)}
          </th>
        ) : (
          <td key={column.id} className={className} data-head={foldHead || undefined}>
            {column.cell(row)}
          </td>
        );
      })}
    </tr>
  );
}
