import type { ReactNode } from 'react';
import { classNames } from './class-names';

export type TableColumn<R> = {
  readonly key: string;
  readonly head: ReactNode;
  /** Numbers stand right, in digits of one width. */
  readonly numeric?: boolean;
  /** Dates and codes stay on one line; the table scrolls instead. */
  readonly oneLine?: boolean;
  readonly cell: (row: R) => ReactNode;
};

type Props<R> = {
  readonly caption: string;
  readonly columns: readonly TableColumn<R>[];
  readonly rows: readonly R[];
  readonly rowKey: (row: R) => string;
  /** Rows that carry a doubt get the striped edge. */
  readonly doubted?: (row: R) => boolean;
  readonly empty: ReactNode;
};

/** A dense table with a head that stays; scrolls sideways inside itself on a narrow screen. */
export function DataTable<R>({ caption, columns, rows, rowKey, doubted, empty }: Props<R>) {
  if (rows.length === 0) return <p className="book-line py-6 text-ink-soft">{empty}</p>;
  return (
    <div className="max-h-[75vh] overflow-auto border-y border-paper-line" tabIndex={0} role="region" aria-label={caption}>
      <table className="w-full border-collapse text-sm leading-snug">
        <caption className="sr-only">{caption}</caption>
        <thead className="sticky top-0 z-10 bg-paper-sunk">
          <tr>
            {doubted && <th scope="col" className="w-2 p-0"><span className="sr-only">Doubt</span></th>}
            {columns.map(({ key, head, numeric }) => (
              <th key={key} scope="col" className={classNames('px-2 py-1.5 align-bottom font-bold whitespace-nowrap', numeric ? 'text-right' : 'text-left')}>{head}</th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={rowKey(row)} className="border-t border-paper-line hover:bg-paper-raised">
              {doubted && <td className={classNames('w-2 p-0', doubted(row) ? 'doubt-edge' : '')} />}
              {columns.map(({ key, cell, numeric, oneLine }) => (
                <td key={key} className={classNames('px-2 py-1 align-top', numeric ? 'digits text-right whitespace-nowrap' : oneLine ? 'whitespace-nowrap' : '')}>{cell(row)}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
