import { LEVEL_COLOURS, LEVEL_STYLES, levelVariables } from './figures/level-colours.ts';

/** Style of the report: one sheet, no font or picture from outside. Colours are Okabe–Ito; print is forced to the light set. */

const LIGHT = `--paper:#fff;--ink:#16191d;--quiet:#5c646d;--hair:#c9ced4;--grid:#e3e6ea;--plane:#ececec;--copper:#bfc3c8;--over:#d55e00;--short:#b87700;--short-fill:#e69f00;--h:#0072b2;--v:#009e73;--loop:#a3457a;--bar:#5a6570;--bar-path:#9aa3ad;--bar-back:#eef0f2;${levelVariables(LEVEL_COLOURS)}`;
const DARK = `--paper:#14171a;--ink:#e4e7ea;--quiet:#98a1ab;--hair:#3d444c;--grid:#272c32;--plane:#22272c;--copper:#4a525b;--over:#ff8a3c;--short:#e69f00;--short-fill:#e69f00;--h:#56b4e9;--v:#2fc79b;--loop:#d995ba;--bar:#aab3bd;--bar-path:#6c7681;--bar-back:#23282d;${levelVariables(LEVEL_COLOURS.toReversed())}`;

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

const FIGURE = `
.figure{display:block;width:100%;height:auto;font-size:10px;font-family:inherit}
.figure text,.figure .unit{fill:var(--quiet);unicode-bidi:isolate}
.figure text.label{fill:var(--ink)}
.figure text.minor{fill:var(--quiet);font-size:9px}
.figure .halo{paint-order:stroke;stroke:var(--paper);stroke-width:3px;stroke-linejoin:round}
.middle{text-anchor:middle}
.end{text-anchor:end}
.grid,.frame,.ruler,.stem,.leader,.limit,.pol-h,.pol-v,.tick,.hatch,.copper path,.driven path,.outline,.cable,.loop,.ground,.table,.axis,.ray,.boundary,.arrow,.antenna{fill:none}
.grid{stroke:var(--grid);stroke-width:.7}
.frame{stroke:var(--hair);stroke-width:.8}
.ruler,.table,.ground{stroke:var(--ink);stroke-width:.8}
.ground{stroke-width:1.6}
.table{stroke:var(--quiet)}
.scale-bar{stroke-width:1.2}
.leader{stroke:var(--quiet);stroke-width:.6}
.stem{stroke:var(--hair);stroke-width:.8}
.hatch{stroke:var(--hair);stroke-width:1}
.limit{stroke:var(--ink);stroke-width:1.5;stroke-linejoin:round}
.limit.av{stroke-dasharray:8 3}
.limit.pk{stroke-dasharray:2.5 2.5}
.pol-h{stroke:var(--h);stroke-width:1.6}
.pol-v{stroke:var(--v);stroke-width:1.6}
.tick{stroke-width:1;stroke:var(--quiet)}
.tick.short{stroke:var(--short);stroke-width:1.6}
.tick.over{stroke:var(--over);stroke-width:2.2}
.mark.over .rim{fill:var(--over);stroke:var(--paper);stroke-width:.7}
.mark.short .rim{fill:var(--paper);stroke:var(--short);stroke-width:1.1}
.mark.short .half{fill:var(--short-fill)}
.mark.fine .rim{fill:var(--paper);stroke:var(--ink);stroke-width:.8}
.plane{fill:var(--plane);fill-rule:evenodd;fill-opacity:.75}
.copper path,.driven path{stroke-linecap:round;stroke-linejoin:round}
.copper path{stroke:var(--copper)}
.via{fill:var(--copper)}
.outline{stroke:var(--ink);stroke-width:.9}
.driven path{stroke:var(--h)}
.driven.below path{stroke-dasharray:5 3.2;stroke-linecap:butt}
.driven-via{fill:var(--paper);stroke:var(--h);stroke-width:1}
.pin{stroke:var(--ink);stroke-width:1}
.pin.drive{fill:var(--ink)}
.pin.load{fill:var(--paper)}
.loop{stroke:var(--loop);stroke-width:1.8;stroke-dasharray:1.5 2.5;stroke-linecap:round}
.cable{stroke:var(--ink);stroke-width:1.4}
.cable-joint{fill:var(--ink)}
.finding circle{fill:var(--paper);stroke:var(--over);stroke-width:1.4}
.figure .finding text{fill:var(--ink);font-size:9px;font-weight:600}
.axis{stroke:var(--quiet);stroke-width:.7;stroke-dasharray:7 2 1.5 2}
.ray{stroke:var(--h);stroke-width:.7;stroke-dasharray:3 2.5}
.boundary{stroke:var(--quiet);stroke-width:.8}
.board-solid{fill:var(--h);stroke:var(--h);stroke-width:1.4;stroke-linejoin:round}
.board-plan{fill:var(--plane);stroke:var(--h);stroke-width:1.2}
.antenna{stroke:var(--over);stroke-width:2.4;fill:var(--paper)}
.boom{stroke:var(--ink);stroke-width:.8}
.antenna-dot,.arrow-head{fill:var(--over)}
.arrow{stroke:var(--over);stroke-width:1.4}
.stack,.limit-line,.ruling-band,.casing,.over-line,.cable-current{fill:none}
.stack.other{stroke:var(--bar-path);stroke-width:1.1}
.stack.ruling{stroke:var(--ink);stroke-width:1.9}
.limit-line{stroke:var(--over);stroke-width:.9}
.ruling-band{stroke:var(--ink);stroke-width:3.4}
.casing{stroke:var(--paper);stroke-width:4.4;stroke-linejoin:round;stroke-linecap:round}
.over-line{stroke:var(--ink);stroke-width:1.8;stroke-linejoin:round;stroke-linecap:round}
.cable-joint.rimmed{stroke:var(--paper);stroke-width:1.2}
.cable-area{fill:var(--bar-back)}
.cable-current{stroke:var(--h);stroke-width:1.7;stroke-linejoin:round}
.far-end{fill:var(--paper);stroke:var(--ink);stroke-width:1.3}
.bar-back{fill:var(--bar-back)}
.bar-whole{fill:var(--bar)}
.bar-path{fill:var(--bar-path)}
${LEVEL_STYLES}`;

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

export const STYLES = `:root{${LIGHT}}@media screen and (prefers-color-scheme:dark){:root{${DARK}}}${PAGE}${TABLE}${FIGURE}${PRINT}`;
