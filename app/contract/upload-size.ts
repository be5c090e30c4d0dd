import { AppError } from '../errors.ts';

const MAX_FILE_BYTES = 256e6;

/** Throws `file` for a file that is too large to be given to the program through its window. */
export function refuseUpload(name: string, sizeBytes: number): void {
  if (sizeBytes <= MAX_FILE_BYTES) return;
  const megabytes = (sizeBytes / 1e6).toFixed(0);
  throw new AppError('file', `${name}: must be at most ${MAX_FILE_BYTES / 1e6} MB; received ${megabytes} MB`, name);
}
