import { type ReactElement, useEffect } from 'react';
import { I18nProvider } from 'react-aria-components';
import { EmptyState } from '../components/notes.tsx';
import { Toasts } from '../components/toasts.tsx';
import { LOCALE } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { notices } from '../state/notices.ts';
import { useThemeChoice } from '../state/theme.ts';
import { applyTheme } from '../theme/palette.ts';
import { DropTarget } from './drop-target.tsx';
import { Header } from './header.tsx';
import { Overlays } from './overlays.tsx';
import { StartPage } from './start-page.tsx';
import { StatusBar } from './status-bar.tsx';
import { useCommands } from './use-commands.ts';
import { useSystemMenu } from './use-system-menu.ts';
import css from './window.module.css';
import { Workplace } from './workplace.tsx';

/** The whole window: it composes, and holds no logic. */
export function Window(): ReactElement {
  useCommands();
  useSystemMenu();
  const theme = useThemeChoice();
  useEffect(() => applyTheme(theme), [theme]);
  const project = useApp((state) => state.project);
  useEffect(() => {
    document.title = project === null ? 'Quietboard' : `${project.name} – Quietboard`;
  }, [project]);
  return (
    <I18nProvider locale={LOCALE}>
      <DropTarget>
        <div className={css.window}>
          <Header />
          <main className={css.main}>
            <Middle />
          </main>
          <StatusBar />
        </div>
      </DropTarget>
      <Overlays />
      <Toasts queue={notices} />
    </I18nProvider>
  );
}

function Middle(): ReactElement {
  const hasDocument = useApp(({ history }) => history !== null);
  const isOpening = useApp((state) => state.isOpening);
  if (hasDocument) return <Workplace />;
  return isOpening ? <EmptyState title="Opening the project" /> : <StartPage />;
}
