import Database from 'better-sqlite3';
import { electronBinding } from './native-binding.ts';

/** Opens an SQLite database (a file, its bytes, or `:memory:`) with the native module of the runtime at hand. */
export const newDatabase = (content: string | Buffer, options: Database.Options = {}): Database.Database =>
  new Database(content, { ...nativeBinding(process.versions), ...options });

/** Node finds its own by itself. */
const nativeBinding = ({ electron, modules }: NodeJS.ProcessVersions): { readonly nativeBinding?: string } =>
  electron === undefined ? {} : { nativeBinding: electronBinding(modules) };
