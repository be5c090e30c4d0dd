import type { ReactElement } from 'react';
import { Button } from '../components/button.tsx';
import { ErrorNotice } from '../components/notes.tsx';
import { failureText } from '../state/notices.ts';

/** In place of the window when its host does not answer. */
export const StartFailure = ({ error }: { readonly error: unknown }): ReactElement => (
  <main>
    <ErrorNotice
      title="The window could not start"
      actions={<Button onPress={() => location.reload()}>Try again</Button>}
    >
      {failureText(error)}
    </ErrorNotice>
  </main>
);
