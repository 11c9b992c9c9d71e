/** Development only: ladders of invented content, in every theme (?theme=dark). Never shipped. */
import '../../src/ui/styles/index.css';
import { render } from 'preact';
import { useState } from 'preact/hooks';
import type { LadderContent } from '../../src/core/picture/ladder-content.ts';
import { Ladder } from '../../src/ui/charts/ladder.tsx';
import { LADDER_EXAMPLES } from '../support/ladder-examples.ts';

document.documentElement.dataset.theme = new URLSearchParams(location.search).get('theme') ?? 'light';

function Tried({ name, content, first }: { name: string; content: LadderContent; first: readonly string[] }) {
  const [picked, setPicked] = useState<readonly string[]>(first);
  return (
    <section style={{ background: 'var(--surface)', padding: '8px', border: '1px solid var(--edge)' }}>
      <h2>{name}</h2>
      <Ladder
        content={content}
        sentence={`Ladder of ${name}`}
        words={{
          name,
          keys: 'Arrow keys pick, plus and minus zoom.',
          closer: 'Closer',
          wider: 'Wider',
          whole: 'Whole',
          hidden: (count) => `${count} without a label`,
        }}
        selected={new Set(picked)}
        current={picked[0]}
        onPick={(id) => setPicked(id ? [id] : [])}
      />
    </section>
  );
}

render(
  <main style={{ display: 'flex', flexWrap: 'wrap', gap: '12px', padding: '16px' }}>
    {LADDER_EXAMPLES.map((example) => (
      <div key={example.name} style={{ width: 'min(328px, 100%)' }}>
        <Tried {...example} />
      </div>
    ))}
  </main>,
  document.getElementById('app')!,
);
