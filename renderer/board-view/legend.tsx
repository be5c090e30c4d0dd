import type { ReactElement, ReactNode } from 'react';
import { frequencyText, levelText, quantityText } from '../i18n/format.ts';
import { useDetail } from '../state/hooks.ts';
import { usePalette } from '../theme/palette.ts';
import css from './board-view.module.css';
import { largestOf, SPAN_DB } from './levels.ts';
import { useIsOfThisCopper, useReadyDetail, useShownThings } from './use-scene.ts';

/** What the colours say, for the chosen line. */
export function Legend(): ReactElement | null {
  const [{ colouring, cables }] = useShownThings();
  const state = useDetail();
  const detail = useReadyDetail();
  const { levels } = usePalette();
  const isOfThisCopper = useIsOfThisCopper();
  if (colouring === 'none' || state.kind === 'none' || !isOfThisCopper) return null;
  if (state.kind === 'failed') return <Box>The line cannot be shown on the board: {state.message}</Box>;
  if (detail === null) return <Box>{frequencyText(state.lineHz)}: looking closer …</Box>;
  const { currentMap, pieces } = detail;
  const strongestA = cables ? largestOf(currentMap?.cables.flatMap(({ currentRmsA }) => currentRmsA) ?? []) : 0;
  const densestAPerM = largestOf(currentMap?.cells.map(({ densityRmsAPerM }) => densityRmsAPerM) ?? []);
  const top =
    colouring === 'shares'
      ? pieces[0] && `${levelText(pieces[0].levelDbuvPerM)} dBµV/m`
      : densestAPerM > 0 && quantityText(densestAPerM, 'A/m');
  return (
    <Box>
      <span>
        {frequencyText(detail.frequencyHz)}: {colouring === 'shares' ? 'each piece by itself' : 'current on the planes'}
      </span>
      {top ? (
        <>
          <span className={css.swatches} aria-hidden="true">
            {levels.map((colour) => (
              <span key={colour} style={{ background: colour }} />
            ))}
          </span>
          <span className={css.scale}>
            <span>−{SPAN_DB} dB</span>
            <span>−{SPAN_DB / 2}</span>
            <span>0</span>
          </span>
          <span>0 dB: {top}</span>
          {strongestA > 0 && <span>cables 0 dB: {quantityText(strongestA, 'A')} rms</span>}
        </>
      ) : (
        <span>{colouring === 'shares' ? 'no piece radiates' : 'not solved at this line'}</span>
      )}
    </Box>
  );
}

const Box = ({ children }: { readonly children: ReactNode }): ReactElement => (
  <div className={css.legend} role="status">
    {children}
  </div>
);
