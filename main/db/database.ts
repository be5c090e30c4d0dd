import type Database from 'better-sqlite3';

declare const readable: unique symbol;
declare const writable: unique symbol;

/** A project's database inside a transaction that only reads. */
export type ReadableDb = Database.Database & { readonly [readable]: true };

/** A project's database inside a transaction that may write. Only `ProjectConnection.write` gives one. */
export type WritableDb = ReadableDb & { readonly [writable]: true };
