import { call } from '../api/api.ts';
import { getState } from './app-store.ts';

const FREE_AFTER_MS = 60_000;

/** Gives the user a file: by the system's dialog where the host has one, else as a download. Says whether it was taken. */
export async function saveBytes(name: string, mediaType: string, bytes: Uint8Array<ArrayBuffer>): Promise<boolean> {
  if (getState().info?.hasDialogs) {
    const { file } = await call('dialog.save-bytes', { name, bytes });
    return file !== null;
  }
  const link = document.createElement('a');
  link.href = URL.createObjectURL(new Blob([bytes], { type: mediaType }));
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), FREE_AFTER_MS);
  return true;
}
