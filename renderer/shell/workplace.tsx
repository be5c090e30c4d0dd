import type { ReactElement, ReactNode } from 'react';
import { z } from 'zod';
import { Split } from '../components/split.tsx';
import { type TabEntry, Tabs } from '../components/tabs.tsx';
import { useRemembered } from '../state/remembered.ts';
import { showTab, useTab } from '../state/tabs.ts';
import type { Panel, PanelPlace } from './panel.ts';
import { PanelFrame } from './panel-frame.tsx';
import { PANELS } from './panels.ts';
import { useMedia } from './use-media.ts';
import { WorkNotices } from './work-notices.tsx';
import css from './workplace.module.css';

const shareSchema = z.number().min(0).max(1);

const panelsAt = (place: PanelPlace): readonly Panel[] => PANELS.filter((panel) => panel.place === place);
const viewsAt = (place: PanelPlace): ReactNode =>
  panelsAt(place).map((panel) => <PanelFrame key={panel.name} panel={panel} />);

/** Range strip across the top; spectrum over board; the other parts as tabs beside them. */
export function Workplace(): ReactElement {
  // 200 % zoom on a small screen, or a small window: one column that scrolls.
  const isNarrow = useMedia('(max-width: 56rem), (max-height: 30rem)');
  return (
    <div className={isNarrow ? css.narrow : css.workplace}>
      <div className={css.strip}>{viewsAt('strip')}</div>
      <WorkNotices />
      {isNarrow ? <Column /> : <Area />}
    </div>
  );
}

function Area(): ReactElement {
  const [sideShare, setSideShare] = useRemembered('shell.left-share', shareSchema, 0.62);
  const [upperShare, setUpperShare] = useRemembered('shell.upper-share', shareSchema, 0.46);
  const seen = (
    <Split
      label="Height of the spectrum"
      direction="column"
      share={upperShare}
      onChange={setUpperShare}
      first={viewsAt('spectrum')}
      second={viewsAt('board')}
    />
  );
  return (
    <div className={css.area}>
      <Split
        label="Width of spectrum and board"
        direction="row"
        share={sideShare}
        onChange={setSideShare}
        first={seen}
        second={<SideTabs />}
      />
    </div>
  );
}

const Column = (): ReactElement => (
  <>
    <div className={css.tall}>{viewsAt('spectrum')}</div>
    <div className={css.tall}>{viewsAt('board')}</div>
    <div className={css.tallest}>
      <SideTabs />
    </div>
  </>
);

function SideTabs(): ReactElement {
  const panels = panelsAt('tab');
  const remembered = useTab(panels[0]?.name ?? '');
  const selected = panels.some(({ name }) => name === remembered) ? remembered : (panels[0]?.name ?? '');
  const tabs: TabEntry[] = panels.map((panel) => ({
    name: panel.name,
    label: panel.label,
    content: <PanelFrame panel={panel} />,
  }));
  return <Tabs label="Parts" tabs={tabs} selected={selected} onSelect={showTab} />;
}
