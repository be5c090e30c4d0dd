import { LEVEL_STYLES } from './level-colours.ts';

/** Style of the figures; colours are variables of the palette. For a page on a screen and for print alike. */
export const FIGURE_STYLES = `
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
.ghost,.trend-band,.trend-worst{fill:none}
.ghost{stroke:var(--quiet);stroke-width:.9;stroke-dasharray:1.6 1.2}
.trend-worst{stroke:var(--ink);stroke-width:1.9;stroke-linejoin:round}
.trend-band{stroke:var(--quiet);stroke-width:1.2;stroke-dasharray:1.5 2.5;stroke-linejoin:round}
.trend-band.b0{stroke:var(--h);stroke-dasharray:6 2}
.trend-band.b1{stroke:var(--v);stroke-dasharray:2 2}
.trend-band.b2{stroke:var(--loop);stroke-dasharray:8 2 2 2}
.trend-band.b3{stroke:var(--short);stroke-dasharray:4 3}
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
