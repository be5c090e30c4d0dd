import type { Transport } from '../../app/contract/transport.ts';
import { LoopbackTransport, takeToken } from './loopback.ts';

declare global {
  interface Window {
    /** Put there by the desktop window's preload script. */
    readonly quietboard?: Transport;
  }
}

/** The desktop window's own transport, else HTTP to where the page came from. */
export const chooseTransport = (onReconnected: () => void): Transport =>
  window.quietboard ?? new LoopbackTransport(takeToken(), onReconnected);
