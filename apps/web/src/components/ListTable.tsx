import { Skeleton } from '@mantine/core';
import type { ReactNode } from 'react';
import classes from './ListTable.module.css';

export interface Column<Sort extends string = string> {
  /** Heading; with `hidden` it is only spoken. */
  label: string;
  hidden?: boolean;
  numeric?: boolean;
  /** Narrower than this the column steps aside. */
  from?: 'md' | 'lg';
  /** The sort key of the column, where it has one. */
  sort?: Sort;
  width?: string;
}

interface Props<Sort extends string> {
  label: string;
  columns: readonly Column<Sort>[];
  /** Key in force, with a leading '-' for descending. */
  sort?: string;
  onSort?: (sort: Sort | `-${Sort}`) => void;
  /** Shows grey rows in the height of real ones. */
  loading?: boolean;
  children: ReactNode;
}

/** A list as a table: fine rules between rows, headings that sort. The body is made of `Row`s. */
export function ListTable<Sort extends string>({ label, columns, sort, onSort, loading, children }: Props<Sort>) {
  return (
    <table className={classes.table} aria-label={label} aria-busy={loading || undefined}>
      <thead>
        <tr>
          {columns.map((column) => (
            <Heading key={column.label} column={column} sort={sort} onSort={onSort} />
          ))}
        </tr>
      </thead>
      <tbody>{loading ? <SkeletonRows columns={columns} /> : children}</tbody>
    </table>
  );
}

function Heading<Sort extends string>({
  column,
  sort,
  onSort,
}: {
  column: Column<Sort>;
  sort: string | undefined;
  onSort: Props<Sort>['onSort'];
}) {
  const { sort: key, label } = column;
  const direction = key && (sort === key ? 'ascending' : sort === `-${key}` ? 'descending' : 'none');
  return (
    <th
      scope="col"
      aria-sort={direction || undefined}
      data-from={column.from}
      data-numeric={column.numeric || undefined}
      style={{ width: column.width }}
    >
      {key && onSort ? (
        <button
          type="button"
          className={classes.sort}
          onClick={() => onSort(direction === 'ascending' ? `-${key}` : key)}
        >
          {label}
          <span aria-hidden="true">{{ ascending: '↑', descending: '↓', none: '' }[direction || 'none']}</span>
        </button>
      ) : (
        <span className={column.hidden ? classes.spoken : undefined}>{label}</span>
      )}
    </th>
  );
}

function SkeletonRows({ columns }: { columns: readonly Column[] }) {
  return Array.from({ length: 6 }, (_, row) => (
    <tr key={row}>
      {columns.map((column, index) => (
        <Cell key={column.label} column={column}>
          {!column.hidden && <Skeleton h={14} w={index === 0 ? `${70 - (row % 3) * 14}%` : '60%'} />}
        </Cell>
      ))}
    </tr>
  ));
}

/** A cell that follows what its column says about width and numbers. */
function Cell({ column, children }: { column: Column | undefined; children: ReactNode }) {
  return (
    <td data-from={column?.from} data-numeric={column?.numeric || undefined}>
      {children}
    </td>
  );
}

/** The cells of one row, in the order of the columns. */
export function Row({ columns, cells }: { columns: readonly Column[]; cells: readonly ReactNode[] }) {
  return (
    <tr>
      {columns.map((column, index) => (
        <Cell key={column.label} column={column}>
          {cells[index]}
        </Cell>
      ))}
    </tr>
  );
}
