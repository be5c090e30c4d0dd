import type { ReactElement, ReactNode } from 'react';
import { Button, Dialog, DialogTrigger, Popover, Tooltip } from 'react-aria-components';
import { classes } from './classes.ts';
import css from './tooltip.module.css';

/** The text beside a control while it is pointed at or focused; inside a `TooltipTrigger`. */
export function Tip({ children }: { readonly children: ReactNode }): ReactElement {
  return (
    <Tooltip className={css.tip!} offset={4}>
      {children}
    </Tooltip>
  );
}

export interface HelpTipProps {
  /** The question it answers: "What is a return path?" */
  readonly question: string;
  readonly children: ReactNode;
}

/** A small question mark that opens a few sentences. */
export function HelpTip({ question, children }: HelpTipProps): ReactElement {
  return (
    <DialogTrigger>
      {/* Its own button wherever it stands: inside a select it would else open the list. */}
      <Button slot={null} className={css.help!} aria-label={question}>
        ?
      </Button>
      <Popover className={classes(css.popover)} offset={4}>
        <Dialog className={css.text!} aria-label={question}>
          <h3>{question}</h3>
          {children}
        </Dialog>
      </Popover>
    </DialogTrigger>
  );
}
