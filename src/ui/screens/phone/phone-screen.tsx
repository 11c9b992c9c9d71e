/** This phone: what its sensor can see, where readings are kept, units and theme, and what the program is. */
import type { App } from '../../../app/app.ts';
import type { PhonePart } from '../../../app/route.ts';
import { THEMES } from '../../../app/settings.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { Choice } from '../../components/choice.tsx';
import { Page } from '../../components/page.tsx';
import { Row, Rows } from '../../components/rows.tsx';
import { Later } from '../../later.tsx';
import { useLive } from '../../use-live.ts';
import { AboutPart, CautionsPart, LicencesPart, PrivacyPart } from './about-parts.tsx';
import { CheckPart } from './check-part.tsx';
import { LogPart } from './log-part.tsx';
import { StoragePart } from './storage-part.tsx';

const text = officeText.phone;

export function PhoneScreen({ app, part }: { readonly app: App; readonly part?: PhonePart }) {
  if (!part) return <Overview app={app} />;
  return (
    <Page
      key={part}
      over={screenText.tabs.phone}
      title={text.parts[part].title}
      back={{ label: screenText.common.back, onClick: () => app.navigation.back({ screen: 'phone' }) }}
    >
      <Part app={app} part={part} />
    </Page>
  );
}

function Part({ app, part }: { readonly app: App; readonly part: PhonePart }) {
  switch (part) {
    case 'check':
      return <CheckPart app={app} />;
    case 'storage':
      return <StoragePart app={app} />;
    case 'limits':
      return (
        <Later load={() => import('./limits-part.tsx')}>{({ LimitsPart }) => <LimitsPart app={app} />}</Later>
      );
    case 'about':
      return <AboutPart app={app} />;
    case 'privacy':
      return <PrivacyPart />;
    case 'cautions':
      return <CautionsPart />;
    case 'licences':
      return <LicencesPart />;
    case 'log':
      return <LogPart app={app} />;
  }
}

function Overview({ app }: { readonly app: App }) {
  const settings = useLive(app.settings);
  const rows = (parts: readonly PhonePart[], label: string) => (
    <Rows label={label}>
      {parts.map((part) => (
        <Row
          key={part}
          href={app.navigation.href({ screen: 'phone', part })}
          title={text.parts[part].title}
          note={text.parts[part].note}
        />
      ))}
    </Rows>
  );
  return (
    <Page title={screenText.tabs.phone}>
      {rows(['check', 'storage', 'limits'], text.parts.check.title)}
      <section class="stack stack-loose">
        <Choice
          legend={text.theme}
          name="theme"
          value={settings.theme}
          options={THEMES.map((value) => ({ value, label: text.themes[value] }))}
          onChange={(theme) => app.settings.change({ theme })}
        />
        <Choice
          legend={text.frequencyUnit}
          name="frequency-unit"
          value={settings.frequencyUnit}
          options={(['Hz', 'r/min'] as const).map((value) => ({ value, label: value }))}
          onChange={(frequencyUnit) => app.settings.change({ frequencyUnit })}
        />
        <Choice
          legend={text.accelerationUnit}
          name="acceleration-unit"
          value={settings.accelerationUnit}
          options={(['m/s²', 'g', 'mg'] as const).map((value) => ({ value, label: value }))}
          onChange={(accelerationUnit) => app.settings.change({ accelerationUnit })}
        />
        <Choice
          legend={text.velocityUnit}
          name="velocity-unit"
          value={settings.velocityUnit}
          options={(['mm/s', 'm/s', 'in/s'] as const).map((value) => ({ value, label: value }))}
          onChange={(velocityUnit) => app.settings.change({ velocityUnit })}
        />
        <Choice
          legend={text.displacementUnit}
          name="displacement-unit"
          value={settings.displacementUnit}
          options={(['µm', 'mm', 'mil'] as const).map((value) => ({ value, label: value }))}
          onChange={(displacementUnit) => app.settings.change({ displacementUnit })}
        />
        <p class="note">{text.language}</p>
      </section>
      {rows(['about', 'privacy', 'cautions', 'licences', 'log'], text.parts.about.title)}
    </Page>
  );
}
