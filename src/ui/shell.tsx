/** Frame around every screen: tabs or rail, list beside the detail on a laptop, notices, files dropped anywhere. */
import type { ComponentChildren } from 'preact';
import { useEffect, useState } from 'preact/hooks';
import type { App } from '../app/app.ts';
import type { Route } from '../app/route.ts';
import { screenText } from '../text/screens.ts';
import { IconAssets, IconHandOver, IconPhone, IconSources, IconStart } from './components/icons.tsx';
import { NoticeList } from './components/notice-list.tsx';
import styles from './shell.module.css';
import { useLive } from './use-live.ts';

const text = screenText.tabs;

const TABS = [
  {
    route: { screen: 'start' },
    label: text.start,
    icon: IconStart,
    covers: ['start', 'reading', 'readings', 'compare', 'pace', 'take'],
  },
  {
    route: { screen: 'assets' },
    label: text.assets,
    icon: IconAssets,
    covers: ['assets', 'site', 'asset', 'spot', 'series'],
  },
  { route: { screen: 'sources' }, label: text.sources, icon: IconSources, covers: ['sources', 'source'] },
  { route: { screen: 'hand-over' }, label: text.handOver, icon: IconHandOver, covers: ['hand-over'] },
  { route: { screen: 'phone' }, label: text.phoneTab, icon: IconPhone, covers: ['phone'] },
] as const satisfies readonly {
  readonly route: Route;
  readonly label: string;
  readonly icon: () => ComponentChildren;
  readonly covers: readonly Route['screen'][];
}[];

export function Shell(props: {
  readonly app: App;
  readonly route: Route;
  /** What stands beside the detail at 900 px and more. */
  readonly list?: ComponentChildren;
  /** No tabs: one thing at a time. */
  readonly bare?: boolean;
  readonly children: ComponentChildren;
}) {
  const { app, route } = props;
  const notices = useLive(app.notices.list);
  const isDropping = useDrop((file) => void app.take.openFile(file));
  const practice = useLive(app.take.plan).practice !== undefined;
  const shape = [styles.shell, props.bare ? styles.bare : '', props.list ? '' : styles.wide].join(' ');
  return (
    <div class={shape}>
      <a
        class={styles.skip}
        href="#main"
        onClick={(event) => {
          event.preventDefault();
          document.querySelector<HTMLElement>('main h1')?.focus();
        }}
      >
        {text.skip}
      </a>
      {practice && <header class={`${styles.strip} no-print`}>{screenText.practiceStrip}</header>}
      {props.list && <aside class={styles.list}>{props.list}</aside>}
      <main class={styles.main} id="main">
        {props.children}
      </main>
      {!props.bare && <Tabs app={app} route={route} />}
      <NoticeList
        notices={notices}
        closeLabel={screenText.common.close}
        onDismiss={(id) => app.notices.dismiss(id)}
      />
      {isDropping && <div class={styles.drop}>{screenText.dropHere}</div>}
    </div>
  );
}

function Tabs({ app, route }: { readonly app: App; readonly route: Route }) {
  return (
    <nav class={`${styles.tabs} no-print`} aria-label={text.label}>
      <p class={styles.brand}>{screenText.appName}</p>
      <ul>
        {TABS.map((tab) => {
          const isCurrent = (tab.covers as readonly string[]).includes(route.screen);
          const Icon = tab.icon;
          return (
            <li key={tab.label}>
              <a
                class={styles.tab}
                href={app.navigation.href(tab.route)}
                {...(isCurrent ? { 'aria-current': 'page' as const } : {})}
              >
                <Icon />
                {tab.label}
              </a>
            </li>
          );
        })}
      </ul>
    </nav>
  );
}

/** Files dropped anywhere on the page; true while one hovers over it. */
function useDrop(onFile: (file: File) => void): boolean {
  const [isOver, setIsOver] = useState(false);
  useEffect(() => {
    const holdsFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false;
    const over = (event: DragEvent) => {
      if (!holdsFiles(event)) return;
      event.preventDefault();
      setIsOver(true);
    };
    const leave = (event: DragEvent) => {
      if (event.relatedTarget === null) setIsOver(false);
    };
    const drop = (event: DragEvent) => {
      if (!holdsFiles(event)) return;
      event.preventDefault();
      setIsOver(false);
      const file = event.dataTransfer?.files[0];
      if (file) onFile(file);
    };
    addEventListener('dragover', over);
    addEventListener('dragleave', leave);
    addEventListener('drop', drop);
    return () => {
      removeEventListener('dragover', over);
      removeEventListener('dragleave', leave);
      removeEventListener('drop', drop);
    };
  }, []);
  return isOver;
}
