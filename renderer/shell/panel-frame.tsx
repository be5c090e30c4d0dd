import { Component, type ReactElement, type ReactNode, Suspense, useId } from 'react';
import { Button } from '../components/button.tsx';
import { ErrorNotice } from '../components/notes.tsx';
import type { Panel } from './panel.ts';
import css from './panel-frame.module.css';

/** A part in its place. A part that fails says so there; the others go on. */
export function PanelFrame({ panel }: { readonly panel: Panel }): ReactElement {
  const id = useId();
  return (
    <section className={css.frame} aria-labelledby={id}>
      <h2 id={id} className={css.name}>
        {panel.label}
      </h2>
      <PanelGuard label={panel.label}>
        <Suspense fallback={null}>
          <panel.Content />
        </Suspense>
      </PanelGuard>
    </section>
  );
}

interface GuardProps {
  readonly label: string;
  readonly children: ReactNode;
}

class PanelGuard extends Component<GuardProps, { readonly message: string | null }> {
  override state = { message: null };

  static getDerivedStateFromError(error: unknown): { message: string } {
    return { message: error instanceof Error ? error.message : String(error) };
  }

  override render(): ReactNode {
    if (this.state.message === null) return this.props.children;
    return (
      <ErrorNotice
        title={`${this.props.label} cannot be shown`}
        actions={<Button onPress={() => this.setState({ message: null })}>Show again</Button>}
      >
        <p>{this.state.message}</p>
        <p>Your work is kept. If it happens again, take back the last change (undo).</p>
      </ErrorNotice>
    );
  }
}
