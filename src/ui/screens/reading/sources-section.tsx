import type { Judgement } from '../../../core/model/judgement.ts';
import { readingText } from '../../../text/reading-screen.ts';
import { sourceKindName } from '../../../text/sources.ts';
import { LinkButton } from '../../components/button.tsx';
import { Row, Rows } from '../../components/rows.tsx';
import type { ReadingLinks, ReadingView } from './reading-use-cases.ts';
import { sentenceCase } from './pair-card.tsx';
import { Section } from './section.tsx';

/** The sources that this reading is held against, each a way to its form. */
export function SourcesSection(props: {
  readonly view: ReadingView;
  readonly judgement: Judgement;
  readonly links: ReadingLinks;
}) {
  const { view, judgement, links } = props;
  const words = readingText.sources;
  const countOf = (name: string) => judgement.forcings.filter((forcing) => forcing.source === name).length;
  return (
    <Section title={words.title}>
      {view.sources.length === 0 ? (
        <p>{words.none}</p>
      ) : (
        <Rows label={words.title}>
          {view.sources.map(({ id, source }) => (
            <Row
              key={id}
              href={links.source(id)}
              title={source.name}
              note={`${sentenceCase(sourceKindName(source.kind))}, ${words.gives(countOf(source.name))}`}
            />
          ))}
        </Rows>
      )}
      {view.hasOwnLimits && (
        <p class="note">
          {readingText.pair.ownLimits} <a href={links.limits}>{readingText.pair.seeLimits}</a>
        </p>
      )}
      <div class="no-print">
        <LinkButton href={links.newSource(view.reading._id)}>{words.add}</LinkButton>
      </div>
    </Section>
  );
}
