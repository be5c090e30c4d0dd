import type { ReactElement, ReactNode } from 'react';
import { Tabs as AriaTabs, Tab, TabList, TabPanel } from 'react-aria-components';
import css from './tabs.module.css';

export interface TabEntry {
  readonly name: string;
  readonly label: ReactNode;
  readonly content: ReactNode;
}

export interface TabsProps {
  readonly label: string;
  readonly tabs: readonly TabEntry[];
  readonly selected: string;
  readonly onSelect: (name: string) => void;
}

/** Views of which one is seen; the others are not mounted. */
export function Tabs({ label, tabs, selected, onSelect }: TabsProps): ReactElement {
  return (
    <AriaTabs className={css.tabs!} selectedKey={selected} onSelectionChange={(key) => onSelect(String(key))}>
      <TabList className={css.list!} aria-label={label}>
        {tabs.map((tab) => (
          <Tab key={tab.name} id={tab.name} className={css.tab!}>
            {tab.label}
          </Tab>
        ))}
      </TabList>
      {tabs.map((tab) => (
        <TabPanel key={tab.name} id={tab.name} className={css.panel!}>
          {tab.content}
        </TabPanel>
      ))}
    </AriaTabs>
  );
}
