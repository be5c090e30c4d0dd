import type { ReactElement, ReactNode } from 'react';
import { Disclosure as AriaDisclosure, Button, DisclosurePanel, Heading } from 'react-aria-components';
import css from './disclosure.module.css';
import { Icon } from './icons.tsx';

export interface DisclosureProps {
  readonly title: ReactNode;
  readonly children: ReactNode;
  readonly isOpen?: boolean;
  readonly onChange?: (isOpen: boolean) => void;
  readonly isOpenAtFirst?: boolean;
}

/** A heading that opens what is under it. */
export function Disclosure({
  title,
  children,
  isOpen,
  onChange,
  isOpenAtFirst = false,
}: DisclosureProps): ReactElement {
  return (
    <AriaDisclosure
      className={css.disclosure!}
      defaultExpanded={isOpenAtFirst}
      {...(isOpen !== undefined && { isExpanded: isOpen })}
      {...(onChange !== undefined && { onExpandedChange: onChange })}
    >
      <Heading className={css.heading!} level={3}>
        <Button slot="trigger" className={css.button!}>
          <Icon name="right" />
          {title}
        </Button>
      </Heading>
      <DisclosurePanel className={css.panel!}>{children}</DisclosurePanel>
    </AriaDisclosure>
  );
}
