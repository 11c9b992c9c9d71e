import type { App } from '../../../app/app.ts';
import { CAUTION_CODES } from '../../../core/model/judgement.ts';
import { cautionSentence } from '../../../text/cautions.ts';
import { INDICATIVE_LINE } from '../../../text/indicative.ts';
import { officeText } from '../../../text/office-screens.ts';
import { IndicativeLine } from '../../components/indicative-line.tsx';
import { FactList } from './fact-list.tsx';

const text = officeText.phone;

/** What it is, in which version. */
export const AboutPart = ({ app }: { readonly app: App }) => (
  <>
    {text.about.paragraphs.map((paragraph) => (
      <p key={paragraph}>{paragraph}</p>
    ))}
    <IndicativeLine text={INDICATIVE_LINE} />
    <FactList
      facts={[
        [text.about.version, app.about.version],
        [text.about.commit, app.about.commit],
        [text.about.analysisVersion, String(app.about.analysisVersion)],
        [text.about.device, app.store.device],
      ]}
    />
  </>
);

export const PrivacyPart = () => (
  <>
    {text.privacy.map((paragraph) => (
      <p key={paragraph}>{paragraph}</p>
    ))}
  </>
);

export const CautionsPart = () => (
  <>
    <IndicativeLine text={INDICATIVE_LINE} />
    <ul class="stack">
      {CAUTION_CODES.map((code) => (
        <li key={code}>{cautionSentence(code)}</li>
      ))}
    </ul>
  </>
);

export const LicencesPart = () => (
  <>
    <p>{text.licences}</p>
    <p>
      <a href="./notices.txt">{text.notices}</a>
    </p>
  </>
);
