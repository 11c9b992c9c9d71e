/** Hand over: readings in and out of this phone. */
import type { App } from '../../../app/app.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { FileButton } from '../../components/file-button.tsx';
import { Page } from '../../components/page.tsx';

const text = officeText.handOver;

export function HandOverScreen({ app }: { readonly app: App; readonly reading?: string }) {
  return (
    <Page title={screenText.tabs.handOver}>
      <section class="stack">
        <h2>{text.receive}</h2>
        <p class="quiet">{text.receiveNote}</p>
        <div class="row">
          <FileButton label={screenText.start.openFile} onFile={(file) => void app.take.openFile(file)} />
        </div>
      </section>
    </Page>
  );
}
