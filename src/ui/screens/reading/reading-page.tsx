import { useEffect, useMemo, useState } from 'preact/hooks';
import { Page } from '../../components/page.tsx';
import { readingText } from '../../../text/reading-screen.ts';
import { ReadingBody } from './reading-body.tsx';
import type { ReadingPageProps } from './reading-page-props.ts';
import type { OpenedView } from './reading-use-cases.ts';

/** Opens the reading and follows its changes; says in words when there is nothing to show. */
export function ReadingPage({ id, cases, links, units, spotDialog }: ReadingPageProps) {
  const [opened, setOpened] = useState<OpenedView | undefined>();
  const [error, setError] = useState<unknown>();
  useEffect(() => {
    let isCurrent = true;
    const load = async () => {
      try {
        const next = await cases.open(id);
        if (isCurrent) setOpened(next);
      } catch (reason) {
        if (isCurrent) setError(reason);
      }
    };
    void load();
    const stop = cases.subscribe(() => void load());
    return () => {
      isCurrent = false;
      stop();
    };
  }, [id, cases]);
  const back = useMemo(() => ({ label: readingText.back, onClick: links.back }), [links]);
  if (error !== undefined) throw error;
  if (opened === undefined)
    return (
      <p class="quiet" role="status">
        {readingText.loading}
      </p>
    );
  if (opened.state !== 'open') {
    const isMissing = opened.state === 'missing';
    return (
      <Page title={isMissing ? readingText.missing : readingText.newer} back={back}>
        <p>{isMissing ? readingText.missingNote : readingText.newerNote}</p>
      </Page>
    );
  }
  return (
    <ReadingBody
      view={opened.view}
      cases={cases}
      links={links}
      units={units}
      {...(spotDialog ? { spotDialog } : {})}
    />
  );
}
