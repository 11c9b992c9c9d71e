import type { App } from '../../app/app.ts';
import { screenText } from '../../text/screens.ts';
import { LinkButton } from '../components/button.tsx';
import { Page } from '../components/page.tsx';

/** An address that leads nowhere: said plainly, with the way on. */
export function LostScreen({ app }: { readonly app: App }) {
  return (
    <Page title={screenText.lost.title}>
      <p>{screenText.lost.note}</p>
      <div class="row">
        <LinkButton kind="main" href={app.navigation.href({ screen: 'start' })}>
          {screenText.lost.start}
        </LinkButton>
      </div>
    </Page>
  );
}
