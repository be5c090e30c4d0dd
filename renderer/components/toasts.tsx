import type { ReactElement } from 'react';
import {
  Text,
  UNSTABLE_Toast as Toast,
  UNSTABLE_ToastContent as ToastContent,
  type UNSTABLE_ToastQueue as ToastQueue,
  UNSTABLE_ToastRegion as ToastRegion,
} from 'react-aria-components';
import { Button, IconButton } from './button.tsx';
import { classes } from './classes.ts';
import { Icon } from './icons.tsx';
import css from './toasts.module.css';

export interface ToastText {
  readonly tone: 'plain' | 'problem';
  readonly text: string;
  readonly action?: { readonly label: string; readonly run: () => void };
}

/** Notices at the lower edge; F6 leads there. */
export function Toasts({ queue }: { readonly queue: ToastQueue<ToastText> }): ReactElement {
  return (
    <ToastRegion queue={queue} className={css.region!} aria-label="Notices">
      {({ toast }) => {
        const { tone, text, action } = toast.content;
        return (
          <Toast toast={toast} className={classes(css.toast, tone === 'problem' && css.problem)}>
            {tone === 'problem' && <Icon name="warning" />}
            <ToastContent className={css.text!}>
              <Text slot="title">{text}</Text>
            </ToastContent>
            {action !== undefined && (
              <Button
                slot={null}
                onPress={() => {
                  action.run();
                  queue.close(toast.key);
                }}
              >
                {action.label}
              </Button>
            )}
            <IconButton slot={null} label="Close notice" onPress={() => queue.close(toast.key)}>
              <Icon name="close" />
            </IconButton>
          </Toast>
        );
      }}
    </ToastRegion>
  );
}
