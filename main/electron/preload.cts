/**
 * Runs before the page, in the sandbox, in a world of its own: hands the page a `Transport` and nothing else. Sandboxed
 * scripts are CommonJS and load nothing but "electron", so the names are written out and checked by their types.
 */
const { contextBridge, ipcRenderer } = require('electron') as typeof import('electron');

const CALL: typeof import('./channels.ts', { with: { 'resolution-mode': 'import' }}).CALL_CHANNEL = 'quietboard:call';
const EVENT: typeof import('./channels.ts', { with: { 'resolution-mode': 'import' }}).EVENT_CHANNEL =
  'quietboard:event';

type Listener = (payload: unknown) => void;
const listeners = new Map<string, Set<Listener>>();

ipcRenderer.on(EVENT, (_event, name: string, payload: unknown) => {
  for (const listener of listeners.get(name) ?? []) listener(payload);
});

contextBridge.exposeInMainWorld('quietboard', {
  call: (name: string, input: unknown) => ipcRenderer.invoke(CALL, name, input),
  on: (name: string, listener: Listener) => {
    const own = listeners.get(name) ?? new Set();
    listeners.set(name, own.add(listener));
    return () => {
      own.delete(listener);
    };
  },
});
