import type { Analysis } from '../../../core/model/analysis.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { Section } from './section.tsx';
import styles from './no-mode-advice.module.css';

/** What it means that no mode was found, and what to try before walking away. */
export function NoModeAdvice({ analysis }: { readonly analysis: Analysis }) {
  if (analysis.modes.length > 0) return null;
  const { title, meaning, todo } = readingText.noMode[analysis.procedure];
  return (
    <Section title={title}>
      <p>{meaning}</p>
      <ul class={styles.list}>
        {todo.map((one) => (
          <li key={one}>{one}</li>
        ))}
      </ul>
    </Section>
  );
}
