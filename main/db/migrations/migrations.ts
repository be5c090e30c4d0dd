import type { Migration } from '../migrate.ts';
import { createProject } from './10-create-project.ts';

/** Steps of 10, one file each. Never edit one that shipped: add the next. */
export const migrations: readonly Migration[] = [createProject];

/** What this program writes. */
export const SCHEMA_VERSION = migrations.at(-1)!.version;
