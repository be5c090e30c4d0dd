import { createRoot } from 'react-dom/client';
import { z } from 'zod';
import { connect } from './api/api.ts';
import { chooseTransport } from './api/choose-transport.ts';
import { StartFailure } from './shell/start-failure.tsx';
import { Window } from './shell/window.tsx';
import { saveDraft } from './state/draft.ts';
import { refreshAll, start } from './state/start.ts';
import './theme/tokens.css';
import './theme/base.css';

// The content policy forbids compiled code, which zod would otherwise try first.
z.config({ jitless: true });
connect(chooseTransport(refreshAll));
// A window that is closed goes out of sight first: the last change must not wait for its pause.
addEventListener('visibilitychange', () => {
  if (document.hidden) void saveDraft();
});
const root = createRoot(document.getElementById('root')!);
start().then(
  () => root.render(<Window />),
  (error: unknown) => root.render(<StartFailure error={error} />),
);
