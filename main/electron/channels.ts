/** Between the preload script and the main process; the preload script's own copies are checked against these by type. */
export const CALL_CHANNEL = 'quietboard:call';
export const EVENT_CHANNEL = 'quietboard:event';
