import { z } from 'zod';
import { remember, useRemembered } from './remembered.ts';

/** Which part the side panel shows; any part may ask for another one. */

const KEY = 'shell.tab';
const schema = z.string();

export const showTab = (name: string): void => remember('project', KEY, name);

export const useTab = (first: string): string => useRemembered(KEY, schema, first)[0];
