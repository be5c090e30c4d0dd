import { z } from 'zod';
import { remember, useRemembered } from './remembered.ts';

/** Light, dark, or as the system has it; the same for all projects. */

export const THEME_CHOICES = ['system', 'light', 'dark'] as const;
export type ThemeChoice = (typeof THEME_CHOICES)[number];

const KEY = 'shell.theme';
const schema = z.enum(THEME_CHOICES);

export const useThemeChoice = (): ThemeChoice => useRemembered<ThemeChoice>(KEY, schema, 'system', 'program')[0];
export const chooseTheme = (choice: ThemeChoice): void => remember('program', KEY, choice);
