import { Markup, markup } from './markup.ts';
import { STYLES } from './styles.ts';

/** Nothing is loaded, nothing runs, nothing is sent: the page is what it shows. */
const CONTENT_POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'";

/** A self-contained page for screen (light and dark) and A4 print, well-formed as XML too. */
export const reportPage = (title: string, body: Markup): string =>
  markup`<!DOCTYPE html>
<html lang="en"><head><meta charset="utf-8"/><meta http-equiv="Content-Security-Policy" content="${new Markup(CONTENT_POLICY)}"/><meta name="viewport" content="width=device-width, initial-scale=1"/><title>${title}</title><style>${new Markup(STYLES)}</style></head>
<body>
${body}
</body></html>
`.source;
