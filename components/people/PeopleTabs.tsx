import { Tabs } from '@/components/ui/Tabs';

const tabs = [
  { href: '/people', label: 'Everybody' },
  { href: '/people/classes', label: 'Classes' },
  { href: '/people/terms', label: 'Terms' },
  { href: '/people/import', label: 'Import' },
];

/** The registrar's ledgers of people. */
export const PeopleTabs = () => <Tabs label="People" tabs={tabs} />;
