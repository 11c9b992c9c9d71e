/** Hand over: readings out of this phone and into it, and help for each road. */
import type { App } from '../../../app/app.ts';
import { handOverText as text } from '../../../text/hand-over.ts';
import { screenText } from '../../../text/screens.ts';
import { Page } from '../../components/page.tsx';
import { BackUpSection } from './back-up-section.tsx';
import { GiveSection } from './give-section.tsx';
import styles from './hand-over.module.css';
import { ReceiveSection } from './receive-section.tsx';
import { TeamStoreSection } from './team-store-section.tsx';

export function HandOverScreen({ app, reading }: { readonly app: App; readonly reading?: string }) {
  return (
    <Page title={screenText.tabs.handOver}>
      <div class={styles.columns}>
        <div class="stack stack-loose">
          <GiveSection app={app} {...(reading ? { reading } : {})} />
        </div>
        <div class="stack stack-loose">
          <ReceiveSection app={app} />
          <BackUpSection app={app} />
          <TeamStoreSection app={app} />
          <Help />
        </div>
      </div>
    </Page>
  );
}

const Help = () => (
  <details>
    <summary>{text.help}</summary>
    <dl class={styles.roads}>
      {text.roads.map((road) => (
        <div key={road.name}>
          <dt>{road.name}</dt>
          <dd>{road.text}</dd>
        </div>
      ))}
    </dl>
  </details>
);
