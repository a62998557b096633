import { useQuery } from '@tanstack/react-query';
import { PeoplePanel } from '../features/admin/people-panel.tsx';
import { SchoolPanel } from '../features/admin/school-panel.tsx';
import { TrailPanel } from '../features/admin/trail-panel.tsx';
import { schoolQuery } from '../features/admin/admin.queries.ts';
import { Head, Page } from '../ui/page.tsx';
import { Tabs } from '../ui/tabs.tsx';

export function Component() {
  const school = useQuery(schoolQuery);
  return (
    <Page wide>
      <Head h1={school.data?.name ?? 'Your school'} lead="People, rules of the school, mail, and who changed what." />
      <Tabs
        label="Parts of the school"
        tabs={[
          { id: 'people', label: 'People', panel: <PeoplePanel /> },
          { id: 'school', label: 'School', panel: <SchoolPanel /> },
          { id: 'trail', label: 'Trail', panel: <TrailPanel zone={school.data?.timeZone ?? 'UTC'} /> },
        ]}
      />
    </Page>
  );
}
