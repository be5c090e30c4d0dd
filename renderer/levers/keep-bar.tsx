import { type ReactElement, useState } from 'react';
import { Button } from '../components/button.tsx';
import { TextField } from '../components/text-field.tsx';
import { useApp } from '../state/app-store.ts';
import { redo, undo } from '../state/document.ts';
import { useBase, useJob, useProblems, useUndoLabels } from '../state/hooks.ts';
import { attempt } from '../state/notices.ts';
import { discardChanges, keepAsRevision } from '../state/result.ts';
import { sameWork } from '../state/work.ts';
import css from './levers.module.css';

/** What to do with the change: keep it under a name, or let it go. */
export function KeepBar(): ReactElement {
  const revision = useBase()?.layout.revision ?? '';
  const isReadOnly = useApp((state) => state.project?.isReadOnly ?? true);
  const isChanged = useApp(
    ({ kept, history }) => kept !== null && history !== null && !sameWork(kept.work, history.present),
  );
  const isEstimating = useJob('estimate') !== undefined;
  const hasProblems = useProblems().length > 0;
  const steps = useUndoLabels();
  const [name, setName] = useState('');
  const [note, setNote] = useState('');
  const trimmed = name.trim();
  const keep = () =>
    attempt('Keep as revision', async () => {
      await keepAsRevision(trimmed, note.trim());
      setName('');
      setNote('');
    });
  return (
    <section className={css.keep} aria-label="Keep or discard">
      <div className={css.keepFields}>
        <TextField
          label="New revision"
          value={name}
          placeholder={revision === '' ? 'name' : `after ${revision}`}
          maxLength={200}
          onChange={setName}
        />
        <TextField label="Note" value={note} placeholder="what was changed" maxLength={10_000} onChange={setNote} />
      </div>
      <div className={css.buttons}>
        <Button
          look="primary"
          isDisabled={trimmed === '' || isReadOnly || isEstimating || hasProblems}
          onPress={() => void keep()}
        >
          Keep as revision
        </Button>
        <Button isDisabled={!isChanged || isEstimating} onPress={discardChanges}>
          Discard
        </Button>
        <span className={css.steps}>
          {steps.undo !== null && (
            <Button look="quiet" onPress={undo}>
              Undo: {steps.undo}
            </Button>
          )}
          {steps.redo !== null && (
            <Button look="quiet" onPress={redo}>
              Redo: {steps.redo}
            </Button>
          )}
        </span>
      </div>
    </section>
  );
}
