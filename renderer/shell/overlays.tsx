import type { ReactElement } from 'react';
import { CAUTIONS, DEFERENCE } from '../../app/report/cautions.ts';
import { showOverlay, useOverlay } from '../commands/overlays.ts';
import { Dialog } from '../components/dialog.tsx';
import { useApp } from '../state/app-store.ts';
import { CommandPalette } from './command-palette.tsx';
import css from './overlays.module.css';
import { Shortcuts } from './shortcuts.tsx';

const close = (): void => showOverlay(null);

/** What lies over the window for a moment. */
export function Overlays(): ReactElement {
  const overlay = useOverlay((state) => state.overlay);
  return (
    <>
      <CommandPalette isOpen={overlay === 'palette'} onClose={close} />
      <Dialog title="Keys" isOpen={overlay === 'shortcuts'} onClose={close}>
        <Shortcuts />
      </Dialog>
      <Dialog title="What an estimate is worth" isOpen={overlay === 'cautions'} onClose={close}>
        <Cautions />
      </Dialog>
    </>
  );
}

function Cautions(): ReactElement {
  const cautions = useApp(({ info }) => info?.cautions) ?? CAUTIONS;
  return (
    <div className={css.cautions}>
      <ul>
        {cautions.map((caution) => (
          <li key={caution}>{caution}</li>
        ))}
      </ul>
      <p>{DEFERENCE}</p>
    </div>
  );
}
