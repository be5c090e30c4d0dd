import type { ReactElement } from 'react';
import { countText } from '../../app/report/format.ts';
import { runCommand } from '../commands/run-command.ts';
import { Button } from '../components/button.tsx';
import { ErrorNotice } from '../components/notes.tsx';
import { setState, useApp } from '../state/app-store.ts';
import { keepMine, takeTheirs } from '../state/draft.ts';
import { attempt } from '../state/notices.ts';
import { ImportNotice } from './import-notice.tsx';
import { commandNamed } from './use-commands.ts';
import css from './work-notices.module.css';

/** What must be known about the whole work, over the parts. */
export const WorkNotices = (): ReactElement => (
  <div className={css.notices}>
    <DraftNotice />
    <FailureNotice />
    <ImportNotice />
  </div>
);

function DraftNotice(): ReactElement | null {
  const draft = useApp((state) => state.draft);
  if (draft.kind === 'failed') {
    return (
      <ErrorNotice
        title="The last changes are not saved"
        actions={<Button onPress={() => runCommand(commandNamed('project.save'))}>Save again</Button>}
      >
        {draft.message}
      </ErrorNotice>
    );
  }
  if (draft.kind !== 'conflict') return null;
  const drives = draft.theirs.document.sources.drives?.length ?? 0;
  return (
    <ErrorNotice
      title="Another window changed this project at the same time"
      actions={
        <>
          <Button onPress={takeTheirs}>Take theirs</Button>
          <Button onPress={() => void attempt('Save', keepMine)}>Keep mine</Button>
        </>
      }
    >
      Theirs has {countText(drives, 'driven net')}. Taking it is a step that can be undone; keeping yours replaces it in
      the other window too.
    </ErrorNotice>
  );
}

function FailureNotice(): ReactElement | null {
  const failure = useApp((state) => state.failure);
  if (failure === null) return null;
  return (
    <ErrorNotice
      title="No estimate could be made"
      actions={<Button onPress={() => setState({ failure: null })}>Close</Button>}
    >
      {failure}
    </ErrorNotice>
  );
}
