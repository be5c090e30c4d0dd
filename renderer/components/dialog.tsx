import type { ReactElement, ReactNode } from 'react';
import { Dialog as AriaDialog, Heading, Modal, ModalOverlay } from 'react-aria-components';
import { IconButton } from './button.tsx';
import css from './dialog.module.css';
import { Icon } from './icons.tsx';

export interface DialogProps {
  readonly title: string;
  readonly isOpen: boolean;
  readonly onClose: () => void;
  readonly children: ReactNode;
  /** Buttons, the one that goes on last. */
  readonly actions?: ReactNode;
}

/** In front of everything, for what needs an answer first; never for what can be undone. */
export function Dialog({ title, isOpen, onClose, children, actions }: DialogProps): ReactElement {
  return (
    <ModalOverlay
      className={css.overlay!}
      isDismissable
      isOpen={isOpen}
      onOpenChange={(isStillOpen) => !isStillOpen && onClose()}
    >
      <Modal className={css.modal!}>
        <AriaDialog className={css.dialog!}>
          <header className={css.header}>
            <Heading slot="title">{title}</Heading>
            <IconButton label="Close" onPress={onClose}>
              <Icon name="close" />
            </IconButton>
          </header>
          {/* biome-ignore lint/a11y/noNoninteractiveTabindex: what scrolls must be reached by keys, even where it holds only text. */}
          <section className={css.body} tabIndex={0} aria-label={title}>
            {children}
          </section>
          {actions !== undefined && <footer className={css.actions}>{actions}</footer>}
        </AriaDialog>
      </Modal>
    </ModalOverlay>
  );
}
