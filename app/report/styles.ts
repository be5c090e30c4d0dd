import { FIGURE_STYLES } from './figures/figure-styles.ts';
import { DARK, LIGHT } from './palette.ts';

/** Style of the report: one sheet, no font or picture from outside. Colours are Okabe–Ito; print is forced to the light set. */

const variables = (palette: ReadonlyMap<string, string>): string =>
  [...palette].map(([name, colour]) => `--${name}:${colour}`).join(';');

const PAGE = `
*{box-sizing:border-box}
html{color-scheme:light dark;background:var(--paper)}
body{margin:0 auto;max-width:920px;padding:28px 32px 60px;background:var(--paper);color:var(--ink);font:14px/1.42 "Helvetica Neue",Helvetica,Arial,"Liberation Sans",sans-serif;font-variant-numeric:tabular-nums lining-nums;overflow-wrap:anywhere}
h1{font-size:21px;font-weight:600;margin:0 0 10px;letter-spacing:-.01em}
h2{font-size:15px;font-weight:600;margin:0 0 8px;padding-top:7px;border-top:1px solid var(--ink)}
h3{font-size:13px;font-weight:600;margin:14px 0 4px}
section{margin-top:26px}
p,ul,ol{margin:6px 0}
ul,ol{padding-left:20px}
li{margin:3px 0}
figure{margin:0}
figcaption,.note,.quiet{color:var(--quiet);font-size:12px}
.quiet{font-weight:400}
figcaption span{display:inline-block;margin-right:16px}
.facts{display:grid;grid-template-columns:repeat(2,minmax(0,1fr));margin:0;border-bottom:1px solid var(--hair)}
.facts div{display:grid;grid-template-columns:112px minmax(0,1fr);column-gap:8px;padding:3px 12px 3px 0;border-top:1px solid var(--hair)}
dt{color:var(--quiet)}
.facts .wide{grid-column:1/-1}
dd{margin:0}
.code{font:11.5px/1.5 ui-monospace,Consolas,"Liberation Mono",monospace}
.verdict{border:1px solid var(--ink);padding:12px 16px 10px;margin-top:18px}
.headline{font-size:18px;margin:0 0 4px}
.headline .inline{width:22px;height:22px;vertical-align:-5px;margin-right:6px}
.summary{max-width:100ch;margin:0}
.columns{display:grid;grid-template-columns:1fr 1fr;column-gap:28px}
.columns h3{margin-top:0}`;

const TABLE = `
table{border-collapse:collapse;width:100%;font-size:12.5px}
th,td{text-align:left;vertical-align:top;padding:3px 10px 3px 0;border-bottom:1px solid var(--hair)}
th{font-weight:600;vertical-align:bottom;border-bottom-color:var(--ink)}
th:last-child,td:last-child{padding-right:0}
.n{text-align:right;white-space:nowrap}
.whole{white-space:nowrap}
.strong{font-weight:600}
.points th,.points td:not(:last-child){white-space:nowrap}
.findings td:nth-child(2),.findings td:nth-child(4){min-width:88px}
.points td:first-child{width:18px;padding-right:4px}
.points td:last-child{min-width:150px}
.points th,.points td{padding-right:9px}
.bands{margin-top:10px}
.narrow{width:auto;min-width:360px;margin-top:10px}
.shares{columns:2;column-gap:28px}
.share{break-inside:avoid;margin:0 0 14px}
.share td:first-child,.share th:first-child{width:52%}
.share .n{width:52px}
.share td{padding-top:2px;padding-bottom:2px;border-bottom:0}
.share .path td{color:var(--quiet);font-size:.92em;padding-top:0}
.share .path td:first-child{padding-left:14px}
.bars{vertical-align:middle}
.bar{display:block;width:100%;height:8px;margin-top:3px}
.path .bar{height:5px;margin-top:4px}
.inline{width:14px;height:14px;vertical-align:-2.5px;margin-right:3px;overflow:visible}`;

const PRINT = `
@page{size:A4;margin:14mm 14mm 16mm;@bottom-right{content:counter(page) " / " counter(pages);font:8pt "Helvetica Neue",Arial,"Liberation Sans",sans-serif;color:#5c646d}}
@media print{
html{color-scheme:light}
html,body{background:#fff}
body{max-width:none;padding:0;font-size:9.2pt;-webkit-print-color-adjust:exact;print-color-adjust:exact}
h1{font-size:15pt}h2{font-size:11pt}h3{font-size:9.5pt}
table{font-size:8pt}
th,td{padding-top:2px;padding-bottom:2px}
.points th,.points td{padding-right:6px}
.points td:last-child{min-width:110px}
figcaption,.note,.quiet{font-size:7.8pt}
.code{font-size:7.2pt}
section{margin-top:16pt}
.keep,tr,li,p,figure,.verdict{break-inside:avoid}
thead{display:table-header-group}
h2,h3,.lead{break-after:avoid}
}`;

export const STYLES = `:root{${variables(LIGHT)}}@media screen and (prefers-color-scheme:dark){:root{${variables(DARK)}}}${PAGE}${TABLE}${FIGURE_STYLES}${PRINT}`;
