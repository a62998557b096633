import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import type { ClassAnswer } from '../../shared/schemas/class.ts';
import { classQuery } from '../features/classes/classes.queries.ts';
import { InvitePanel } from '../features/classes/invite-panel.tsx';
import { MembersPanel } from '../features/classes/members-panel.tsx';
import { PairsPanel } from '../features/classes/pairs-panel.tsx';
import { SettingsPanel } from '../features/classes/settings-panel.tsx';
import { ClassRounds } from '../features/rounds/class-rounds.tsx';
import { paths } from '../lib/paths.ts';
import { LinkButton } from '../ui/button.tsx';
import { Head, Page } from '../ui/page.tsx';
import { ErrorState, Waiting } from '../ui/states.tsx';
import { Tabs } from '../ui/tabs.tsx';

export function Component() {
  const { classId = '' } = useParams();
  const found = useQuery(classQuery(classId));
  if (found.isError) {
    return (
      <Page wide>
        <Head h1="This class does not open." />
        <ErrorState
          error={found.error}
          onRetry={() => void found.refetch()}
          acts={<LinkButton to={paths.classes()}>Your classes</LinkButton>}
        />
      </Page>
    );
  }
  if (!found.data) {
    return (
      <Page wide>
        <Waiting />
      </Page>
    );
  }
  return <ClassPage found={found.data} />;
}

function ClassPage({ found }: { readonly found: ClassAnswer }) {
  const students = found.members.filter((member) => member.role === 'student').length;
  return (
    <Page wide>
      <Head
        where={`Class code ${found.joinCode}`}
        h1={found.name}
        lead={`${students} ${students === 1 ? 'student' : 'students'}${found.requests.length > 0 ? `, ${found.requests.length} asking to join` : ''}.`}
        acts={
          <LinkButton kind="primary" to={paths.newRound({ classId: found.id })}>
            Plan a round
          </LinkButton>
        }
      />
      <Tabs
        label="Parts of the class"
        tabs={[
          {
            id: 'people',
            label: 'People',
            panel: <MembersPanel found={found} />,
            ...(found.requests.length > 0 && { count: found.requests.length }),
          },
          { id: 'rounds', label: 'Rounds', panel: <ClassRounds classId={found.id} /> },
          { id: 'invite', label: 'Ways in', panel: <InvitePanel found={found} /> },
          { id: 'pairs', label: 'Keep apart', panel: <PairsPanel found={found} /> },
          { id: 'settings', label: 'Settings', panel: <SettingsPanel found={found} /> },
        ]}
      />
    </Page>
  );
}
