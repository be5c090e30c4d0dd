import { type DragEvent, type ReactElement, type ReactNode, useState } from 'react';
import { useApp } from '../state/app-store.ts';
import { useBase } from '../state/hooks.ts';
import { attempt } from '../state/notices.ts';
import { openFiles } from '../state/project.ts';
import css from './drop-target.module.css';

const carriesFiles = (event: DragEvent): boolean => event.dataTransfer.types.includes('Files');

/** Files can be dropped anywhere; while they hover, the window says what will happen. */
export function DropTarget({ children }: { readonly children: ReactNode }): ReactElement {
  const [fileCount, setFileCount] = useState(0);
  const onDrop = (event: DragEvent) => {
    if (!carriesFiles(event)) return;
    event.preventDefault();
    setFileCount(0);
    const files = [...event.dataTransfer.files];
    void attempt(files.map((file) => file.name).join(', '), () => openFiles(files));
  };
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: dropping is the pointer's way to "Open …", which has its key and its menu entry.
    <div
      className={css.target}
      onDragEnter={(event) => carriesFiles(event) && setFileCount(event.dataTransfer.items.length || 1)}
      onDragOver={(event) => carriesFiles(event) && event.preventDefault()}
      onDragLeave={(event) => event.currentTarget.contains(event.relatedTarget as Node | null) || setFileCount(0)}
      onDrop={onDrop}
    >
      {children}
      {fileCount > 0 && <DropOverlay fileCount={fileCount} />}
    </div>
  );
}

function DropOverlay({ fileCount }: { readonly fileCount: number }): ReactElement {
  const hasProject = useApp(({ project }) => project !== null);
  const board = useBase()?.layout.name;
  const files = fileCount === 1 ? 'the file' : `${fileCount} files`;
  return (
    <div className={css.overlay} role="status">
      <p className={css.title}>Drop {files}</p>
      {board === undefined ? (
        <p>
          A layout export (IPC-2581) or a board file is opened{hasProject ? '' : ' in a new project'}. A sources file
          and waveform tables may come with it.
        </p>
      ) : (
        <>
          <p>A sources file or waveform tables: added to {board}.</p>
          <p>A layout export or a board file: takes the place of {board}. Undo brings it back.</p>
        </>
      )}
    </div>
  );
}
