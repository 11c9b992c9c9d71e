import styles from './data-table.module.css';

export interface TableContent {
  readonly summary: string;
  readonly head: readonly string[];
  readonly rows: readonly (readonly string[])[];
  /** Tells this table from the others of the page. */
  readonly of?: string;
}

/** The numbers of a picture, folded away until asked for; the first cell of a row names it. */
export function DataTable({ summary, head, rows, of }: TableContent) {
  const name = of === undefined ? summary : `${summary}: ${of}`;
  return (
    <details>
      <summary>{summary}</summary>
      <div class={styles.scroll} tabIndex={0} role="region" aria-label={name}>
        <table class={styles.table}>
          <thead>
            <tr>
              {head.map((cell) =>
                cell === '' ? (
                  <td key={cell} />
                ) : (
                  <th key={cell} scope="col">
                    {cell}
                  </th>
                ),
              )}
            </tr>
          </thead>
          <tbody>
            {rows.map((row, index) => (
              <tr key={index}>
                <th scope="row">{row[0]}</th>
                {row.slice(1).map((cell, column) => (
                  <td key={column}>{cell}</td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}
