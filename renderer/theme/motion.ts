const query = matchMedia('(prefers-reduced-motion: reduce)');

/** The system asks for less motion: show the end of a movement at once. */
export const prefersReducedMotion = (): boolean => query.matches;
