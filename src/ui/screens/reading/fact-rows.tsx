import styles from './fact-rows.module.css';

/** Names and values, one pair a line; pairs without a value are left out. */
export function FactRows({ rows }: { readonly rows: readonly (readonly [string, string | undefined])[] }) {
  return (
    <dl class={styles.rows}>
      {rows.map(([name, value]) =>
        value === undefined ? null : (
          <div key={name}>
            <dt>{name}</dt>
            <dd>{value}</dd>
          </div>
        ),
      )}
    </dl>
  );
}
