import type { ReactElement } from 'react';
import type { Contributor, ResultPoint } from '../../app/estimate/result.ts';
import { isItself, KIND_REMARK, pathsOf, pathText } from '../../app/report/contributor-text.ts';
import { degreesText } from '../../app/report/format.ts';
import { standingOf } from '../../app/report/verdict.ts';
import { IconButton } from '../components/button.tsx';
import { Icon } from '../components/icons.tsx';
import { StandingBadge } from '../components/marks/standing-badge.tsx';
import { EmptyState, InfoNotice } from '../components/notes.tsx';
import { HelpTip } from '../components/tooltip.tsx';
import { frequencyText, inLocale, levelText } from '../i18n/format.ts';
import { useApp } from '../state/app-store.ts';
import { useSelectedPoint, useSelection, useShown } from '../state/hooks.ts';
import { caveatsAt } from '../state/result.ts';
import { hover, selectCable, selectNet, stepLine } from '../state/selection.ts';
import { Patterns } from './patterns.tsx';
import css from './spectrum.module.css';
import { useLimits } from './use-limits.ts';

/** Shares further below the strongest are shown as nothing. */
const DEEPEST_DB = 40;
const MOST_SHOWN = 20;
const NO_CAVEATS: readonly never[] = [];

/** What the chosen line is made of, and which way it goes. */
export function Shares(): ReactElement {
  const shown = useShown();
  const point = useSelectedPoint();
  const { requiredMarginDb } = useLimits();
  const caveats = useApp((state) => state.result?.result.caveats ?? NO_CAVEATS);
  if (shown === null) {
    return (
      <EmptyState title="Nothing to take apart yet">
        <p>Estimate, then choose a line in the range strip or the spectrum: here stands what it is made of.</p>
      </EmptyState>
    );
  }
  if (point === null) {
    return (
      <EmptyState title="No line chosen">
        <p>Choose a line in the range strip or the spectrum, or step through them with the arrow keys.</p>
      </EmptyState>
    );
  }
  const here = caveatsAt(caveats, point.frequencyHz).filter(({ toHz }) => toHz > 0);
  return (
    <div className={css.shares}>
      <header className={css.line}>
        <IconButton label="Line before" keys="←" onPress={() => stepLine(shown.points, -1)}>
          <Icon name="left" />
        </IconButton>
        <h3>{frequencyText(point.frequencyHz)}</h3>
        <IconButton label="Next line" keys="→" onPress={() => stepLine(shown.points, 1)}>
          <Icon name="right" />
        </IconButton>
        <StandingBadge standing={standingOf(point, requiredMarginDb)}>
          {levelText(point.levelDbuvPerM)} dBµV/m {point.detector},{' '}
          {point.marginDb < 0
            ? `${levelText(-point.marginDb)} dB over the limit`
            : `${levelText(point.marginDb)} dB under the limit`}
        </StandingBadge>
      </header>
      <p className={css.where}>
        {point.polarization}, antenna at {inLocale(point.antennaHeightM.toFixed(2))} m, turntable{' '}
        {degreesText(point.turntableDeg)}°
      </p>
      <h4>
        Shares, dBµV/m
        <HelpTip question="How do shares add up?">
          <p>
            Each bar is what one net makes by itself, at the antenna’s place of this maximum, and below it through what
            it radiates. Nets of one clock add as phasors, nets of different clocks as powers: bars need not add up to
            the level, and taking the strongest away lowers it at most to what the others make.
          </p>
        </HelpTip>
      </h4>
      <ShareBars point={point} />
      <p className={css.where}>Linear sum of all: {levelText(point.upperBoundDbuvPerM)} dBµV/m, an upper bound.</p>
      {here.map(({ code, message }) => (
        <InfoNotice key={code} title={message} />
      ))}
      <Patterns />
    </div>
  );
}

function ShareBars({ point }: { readonly point: ResultPoint }): ReactElement {
  const { contributors } = point;
  const strongest = contributors[0]?.levelDbuvPerM ?? 0;
  const shown = contributors.filter(({ levelDbuvPerM }) => levelDbuvPerM > strongest - DEEPEST_DB).slice(0, MOST_SHOWN);
  const rest = contributors.length - shown.length;
  return (
    <>
      <ul className={css.bars}>
        {shown.map((contributor) => (
          <ShareRow key={`${contributor.kind} ${contributor.name}`} contributor={contributor} strongest={strongest} />
        ))}
      </ul>
      {rest > 0 && <p className={css.where}>{rest} more, each far below.</p>}
    </>
  );
}

function ShareRow({
  contributor,
  strongest,
}: {
  readonly contributor: Contributor;
  readonly strongest: number;
}): ReactElement {
  const { kind, name, levelDbuvPerM } = contributor;
  const selection = useSelection();
  const hovered = useApp((state) => state.hover.net);
  const isChosen = kind === 'cable' ? selection.cable === name : selection.net === name;
  const choose = () => (kind === 'cable' ? selectCable(isChosen ? null : name) : selectNet(isChosen ? null : name));
  const paths = pathsOf(contributor).filter(
    (path) => !isItself(contributor, path) && path.levelDbuvPerM > strongest - DEEPEST_DB,
  );
  return (
    <li
      className={css.share}
      data-chosen={isChosen || undefined}
      data-hovered={hovered === name || undefined}
      onPointerEnter={() => hover({ net: name })}
      onPointerLeave={() => hover({ net: null })}
    >
      <button type="button" className={css.name} aria-pressed={isChosen} onClick={choose}>
        {name}
        {KIND_REMARK[kind] !== '' && <small> {KIND_REMARK[kind]}</small>}
      </button>
      <Bar level={levelDbuvPerM} strongest={strongest} />
      {paths.map((path) => (
        <div key={path.name} className={css.path}>
          <span>through the {pathText(path.name)}</span>
          <Bar level={path.levelDbuvPerM} strongest={strongest} isPath />
        </div>
      ))}
    </li>
  );
}

const Bar = ({
  level,
  strongest,
  isPath = false,
}: {
  readonly level: number;
  readonly strongest: number;
  readonly isPath?: boolean;
}): ReactElement => (
  <span className={css.level} data-path={isPath || undefined}>
    <span className={css.track}>
      <span
        className={css.fill}
        style={{ width: `${Math.min(100, Math.max(0, 100 * (1 + (level - strongest) / DEEPEST_DB)))}%` }}
      />
    </span>
    <span className={css.number}>{levelText(level)}</span>
  </span>
);
