/** What shakes things here: a list, and the way to add one by kind. */
import type { App } from '../../../app/app.ts';
import type { KnownSource } from '../../../app/sources.ts';
import { SOURCE_KINDS } from '../../../core/model/source.ts';
import { officeText } from '../../../text/office-screens.ts';
import { sourceKindName, unnamedSource } from '../../../text/sources.ts';
import { Page } from '../../components/page.tsx';
import { Row, Rows } from '../../components/rows.tsx';
import { useLoaded } from '../../use-loaded.ts';
import { IconAdd } from '../../components/icons.tsx';
import styles from './sources-screen.module.css';

const text = officeText.sources;

export function SourcesScreen({ app }: { readonly app: App }) {
  const sources = useLoaded(app.store, () => app.sources.list(), []);
  return (
    <Page title={text.title}>
      <p class="quiet">{text.lead}</p>
      {sources && sources.length > 0 && <SourceRows app={app} sources={sources} />}
      <section class="stack">
        <h2>{text.add}</h2>
        <KindLinks app={app} />
      </section>
    </Page>
  );
}

const capital = (words: string) => words.charAt(0).toUpperCase() + words.slice(1);

/** Kinds of sources to add; for a reading the choice takes the place of this step, so that the way back leads to it. */
export function KindLinks({ app, reading }: { readonly app: App; readonly reading?: string }) {
  return (
    <ul class={styles.kinds}>
      {SOURCE_KINDS.map((kind) => {
        const route = { screen: 'source', id: 'new', kind, ...(reading ? { reading } : {}) } as const;
        return (
          <li key={kind}>
            <a
              class={styles.kind}
              href={app.navigation.href(route)}
              onClick={(event) => {
                if (!reading) return;
                event.preventDefault();
                app.navigation.replace(route);
              }}
            >
              <IconAdd />
              <span>
                <strong>{capital(sourceKindName(kind))}</strong>
                <span class="note">{text.kindNotes[kind]}</span>
              </span>
            </a>
          </li>
        );
      })}
    </ul>
  );
}

export function SourceRows(props: {
  readonly app: App;
  readonly sources: readonly KnownSource[];
  readonly current?: string;
}) {
  const { app } = props;
  const tree = useLoaded(app.store, () => app.places.tree(), []);
  const placeName = (entry: KnownSource) => {
    const assets = [...(tree?.sites.flatMap((site) => site.assets) ?? []), ...(tree?.looseAssets ?? [])];
    const asset = assets.find((place) => place.id === entry.asset);
    const site = tree?.sites.find((place) => place.id === entry.site);
    return asset?.name ?? site?.name ?? text.everywhere;
  };
  // a source that nobody named is called by its kind already
  const kindNote = ({ source }: KnownSource) =>
    source.name === unnamedSource(source.kind) ? '' : capital(sourceKindName(source.kind));
  return (
    <Rows label={text.title}>
      {props.sources.map((entry) => (
        <Row
          key={entry.id}
          href={app.navigation.href({ screen: 'source', id: entry.id })}
          title={entry.source.name}
          note={[kindNote(entry), placeName(entry)].filter(Boolean).join(' · ')}
          isCurrent={entry.id === props.current}
        />
      ))}
    </Rows>
  );
}

/** Beside the form, on a laptop. */
export function SourceList({ app, current }: { readonly app: App; readonly current?: string }) {
  const sources = useLoaded(app.store, () => app.sources.list(), []);
  return (
    <nav class="stack" aria-label={text.title}>
      <h2>{text.title}</h2>
      {sources?.length === 0 && <p class="quiet">{text.none}</p>}
      {sources && sources.length > 0 && (
        <SourceRows app={app} sources={sources} {...(current ? { current } : {})} />
      )}
      <a href={app.navigation.href({ screen: 'sources' })}>{text.add}</a>
    </nav>
  );
}
