import { create } from 'zustand';

/** What lies over the window for a moment. */
export type Overlay = 'palette' | 'shortcuts' | 'cautions' | null;

export const useOverlay = create<{ readonly overlay: Overlay }>()(() => ({ overlay: null }));

export const showOverlay = (overlay: Overlay): void => useOverlay.setState({ overlay });
