import type { ReactElement } from 'react';
import { runCommand } from '../commands/run-command.ts';
import { Button } from '../components/button.tsx';
import { dateTimeText } from '../i18n/format.ts';
import { type RecentProject, useApp } from '../state/app-store.ts';
import { attempt } from '../state/notices.ts';
import { openProject } from '../state/project.ts';
import css from './start-page.module.css';
import { commandNamed } from './use-commands.ts';

/** Before a board is open: the sample, one's own file, or a project of before. */
export function StartPage(): ReactElement {
  const project = useApp((state) => state.project);
  return (
    <div className={css.page}>
      <div className={css.columns}>
        <section className={css.lead}>
          <h2>{project === null ? 'How loud is your board?' : `${project.name}: no board yet`}</h2>
          <p>
            Radiated emission of a circuit board, estimated from its layout, beside the limit lines of the standards:
            before the laboratory, and while a change is still cheap.
          </p>
          <div className={css.ways}>
            <Way name="file.open" isFirst={project !== null} title="Your own board">
              A layout export (IPC-2581, .xml or .cvg) or a board file (.board.json). Drop it anywhere in this window.
            </Way>
            <Way name="project.sample" isFirst={project === null} title="The sample">
              A made-up irrigation valve controller with its sources and cables, ready to estimate.
            </Way>
          </div>
          <ol className={css.steps}>
            <li>Open the layout: copper, stack and nets are read, and it says what it could not understand.</li>
            <li>
              Say what switches: the waveform of the clock, the edges of the data lines, the cables that leave the
              board.
            </li>
            <li>Choose standard, class and distance.</li>
            <li>Estimate; choose a line that is over the limit and see what it is made of.</li>
          </ol>
        </section>
        <RecentProjects />
      </div>
    </div>
  );
}

interface WayProps {
  readonly name: string;
  readonly isFirst: boolean;
  readonly title: string;
  readonly children: string;
}

function Way({ name, isFirst, title, children }: WayProps): ReactElement {
  const command = commandNamed(name);
  return (
    <div className={css.way}>
      <h3>{title}</h3>
      <p>{children}</p>
      <Button look={isFirst ? 'primary' : 'plain'} onPress={() => runCommand(command)}>
        {command.label}
      </Button>
    </div>
  );
}

function RecentProjects(): ReactElement | null {
  const recent = useApp((state) => state.recent);
  if (recent.length === 0) return null;
  return (
    <section className={css.recent}>
      <h2>Recent projects</h2>
      <ul>
        {recent.map((project) => (
          <RecentRow key={project.file} project={project} />
        ))}
      </ul>
    </section>
  );
}

const RecentRow = ({ project }: { readonly project: RecentProject }): ReactElement => (
  <li>
    <Button look="quiet" onPress={() => void attempt(project.name, () => openProject(project.file))}>
      {project.name}
    </Button>
    <span className={css.quiet}>{dateTimeText(project.openedAt)}</span>
    <span className={css.path}>{project.file}</span>
  </li>
);
