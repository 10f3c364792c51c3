import { type ReactNode } from 'react';

interface FoldedTableProps {
  /** What is to be unfolded: "The spectrum as a table". */
  label: string;
  /** Names of the columns; the first is that of the rows' headings. */
  columns: readonly ReactNode[];
  rows: readonly { key: string; heading: string; cells: readonly string[] }[];
}

/** The figures of a small chart as a table that stands folded up under it. */
export function FoldedTable({ label, columns, rows }: FoldedTableProps) {
  return (
    <details className="mt-1 text-small">
      <summary className="w-fit text-estuary">{label}</summary>
      {/* What scrolls must take the focus, or the keyboard cannot reach what is beyond its edge (WCAG 2.1.1). */}
      {/* eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex */}
      <div role="group" tabIndex={0} aria-label={label} className="mt-1 max-h-60 overflow-auto">
        <table className="data-table">
          <thead>
            <tr>
              {columns.map((name, at) => (
                <th key={at} scope="col" className={at === 0 ? undefined : 'n'}>
                  {name}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map(({ key, heading, cells }) => (
              <tr key={key}>
                <th scope="row" className="font-normal">
                  {heading}
                </th>
                {cells.map((text, at) => (
                  <td key={at} className="n">
                    {text}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}
