import { readFile } from 'node:fs/promises';
import { protocol } from 'electron';
import { SECURITY_HEADERS } from '../web/security-headers.ts';
import { StaticFiles } from '../web/static-files.ts';

/** The window's page has an origin of its own: neither a file nor a site. */
const SCHEME = 'quietboard';
const PAGE_ORIGIN = `${SCHEME}://app`;
export const PAGE_ADDRESS = `${PAGE_ORIGIN}/index.html`;

/** Before the program is ready: afterwards a scheme can no longer become one that fetches and keeps storage. */
export function registerScheme(): void {
  protocol.registerSchemesAsPrivileged([
    { scheme: SCHEME, privileges: { standard: true, secure: true, supportFetchAPI: true } },
  ]);
}

/** Answers for the page's own files, with the same headers as over HTTP. */
export function servePage(rendererFolder: string): void {
  const files = new StaticFiles(rendererFolder);
  protocol.handle(SCHEME, async ({ url, method }) => {
    const { host, pathname } = new URL(url);
    const file = host === 'app' && method === 'GET' ? files.find(pathname) : undefined;
    const content = file && (await readFile(file.path).catch(() => undefined));
    if (file === undefined || content === undefined)
      return new Response(null, { status: 404, headers: SECURITY_HEADERS });
    return new Response(new Uint8Array(content), { headers: { ...SECURITY_HEADERS, 'Content-Type': file.mediaType } });
  });
}

export const isOwnPage = (url: string): boolean => url === PAGE_ORIGIN || url.startsWith(`${PAGE_ORIGIN}/`);
