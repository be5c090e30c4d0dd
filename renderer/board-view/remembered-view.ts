import { z } from 'zod';

/** What the board part remembers of a project. */

export const cameraSchema = z.object({
  centerXM: z.number(),
  centerYM: z.number(),
  pxPerM: z.number().positive(),
  isFromBottom: z.boolean(),
  fit: z.enum(['board', 'cables']).nullable(),
});
export type RememberedCamera = z.output<typeof cameraSchema>;
export const FIRST_CAMERA: RememberedCamera = {
  centerXM: 0,
  centerYM: 0,
  pxPerM: 1000,
  isFromBottom: false,
  fit: 'board',
};

export const layersSchema = z.object({
  hidden: z.array(z.string()),
  /** Null: the copper layer next to the eye. */
  active: z.string().nullable(),
});
export type RememberedLayers = z.output<typeof layersSchema>;
export const ALL_LAYERS: RememberedLayers = { hidden: [], active: null };

export const shownSchema = z.object({
  colouring: z.enum(['shares', 'current', 'none']),
  cables: z.boolean(),
  findings: z.boolean(),
});
export type RememberedShown = z.output<typeof shownSchema>;
export const EVERYTHING: RememberedShown = { colouring: 'shares', cables: true, findings: true };

export const drawerSchema = z.enum(['closed', 'layers', 'nets', 'findings']);
export type Drawer = z.output<typeof drawerSchema>;
