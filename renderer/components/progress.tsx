import type { ReactElement } from 'react';
import { ProgressBar } from 'react-aria-components';
import { IconButton } from './button.tsx';
import { Icon } from './icons.tsx';
import css from './progress.module.css';

export interface ProgressProps {
  /** What is being done. */
  readonly label: string;
  readonly done: number;
  /** 0: nobody knows how much there is. */
  readonly total: number;
  readonly isStopping?: boolean;
  /** Absent: it cannot be stopped. */
  readonly onStop?: () => void;
}

/** Work under way, by work done. */
export function Progress({ label, done, total, isStopping = false, onStop }: ProgressProps): ReactElement {
  const isUnknown = total === 0;
  return (
    <div className={css.progress}>
      <ProgressBar
        className={css.bar!}
        value={done}
        maxValue={Math.max(total, 1)}
        isIndeterminate={isUnknown}
        aria-label={label}
      >
        {({ percentage }) => (
          <>
            <span className={css.label}>{isStopping ? 'Stopping' : label}</span>
            <span className={css.number}>{isUnknown ? '' : `${Math.floor(percentage ?? 0)} %`}</span>
            <span className={css.track}>
              <span
                className={isUnknown ? css.unknown : css.done}
                style={{ width: isUnknown ? '30%' : `${percentage}%` }}
              />
            </span>
          </>
        )}
      </ProgressBar>
      {onStop !== undefined && (
        <IconButton label={`Stop: ${label}`} isDisabled={isStopping} onPress={onStop}>
          <Icon name="stop" />
        </IconButton>
      )}
    </div>
  );
}
