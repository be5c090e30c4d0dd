import { z } from 'zod';

const rectangleSchema = z.object({
  x: z.number().int(),
  y: z.number().int(),
  width: z.number().int(),
  height: z.number().int(),
});
export type Rectangle = z.output<typeof rectangleSchema>;

export const windowPlaceSchema = z.object({ bounds: rectangleSchema.optional(), isMaximized: z.boolean() });
export type WindowPlace = z.output<typeof windowPlaceSchema>;

export const LEAST_SIZE = { width: 800, height: 560 };
const FIRST_SIZE = { width: 1440, height: 900 };
/** So much of the title bar must lie on a screen for the window to be found and moved. */
const LEAST_SEEN = { width: 120, height: 40 };

/**
 * Where the window opens: where it was, if enough of it is still on a screen (screens come and go), else at the system's
 * choice. `remembered`: whatever was kept, not trusted.
 */
export function windowPlace(
  remembered: unknown,
  screens: readonly Rectangle[],
): WindowPlace & { size: typeof FIRST_SIZE } {
  const parsed = windowPlaceSchema.safeParse(remembered);
  const bounds = parsed.success ? parsed.data.bounds : undefined;
  const isMaximized = parsed.success && parsed.data.isMaximized;
  if (bounds === undefined || !screens.some((screen) => isSeenOn(bounds, screen))) {
    return { isMaximized, size: FIRST_SIZE };
  }
  const size = {
    width: Math.max(LEAST_SIZE.width, bounds.width),
    height: Math.max(LEAST_SIZE.height, bounds.height),
  };
  return { bounds: { ...bounds, ...size }, isMaximized, size };
}

/** Whether the upper edge of the window, where its title is, can be reached on the screen. */
function isSeenOn(window: Rectangle, screen: Rectangle): boolean {
  const seenWidth = Math.min(window.x + window.width, screen.x + screen.width) - Math.max(window.x, screen.x);
  const roomBelow = screen.y + screen.height - window.y;
  return seenWidth >= LEAST_SEEN.width && window.y >= screen.y && roomBelow >= LEAST_SEEN.height;
}
