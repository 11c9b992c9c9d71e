/** Development only: the reading screen on invented readings (?example=stair&theme=dark). Never shipped. */
import '../../src/ui/styles/index.css';
import { render } from 'preact';
import { ReadingPage } from '../../src/ui/screens/reading/reading-page.tsx';
import { exampleCases, noLinks } from '../support/reading-cases.ts';
import { READING_EXAMPLES } from '../support/reading-examples.ts';

const asked = new URLSearchParams(location.search);
document.documentElement.dataset['theme'] = asked.get('theme') ?? 'light';
const name = asked.get('example') ?? 'stair';
const cases = exampleCases(name);
Object.assign(window, { asked: cases.asked });
const id = READING_EXAMPLES.find((one) => one.name === name)?.reading._id ?? 'reading:none';

render(
  <main style={{ maxWidth: asked.get('width') ?? '60rem', margin: '0 auto', padding: '0.75rem 1rem 0' }}>
    <ReadingPage
      id={id}
      cases={cases}
      links={noLinks}
      units={{
        frequency: asked.get('unit') === 'rpm' ? 'r/min' : 'Hz',
        acceleration: 'm/s²',
        velocity: 'mm/s',
        displacement: 'µm',
      }}
    />
  </main>,
  document.getElementById('app')!,
);
