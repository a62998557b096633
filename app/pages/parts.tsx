import { ActionGallery, FieldGallery, SureGallery } from '../ui/gallery-controls.tsx';
import { EdgeGallery } from '../ui/gallery-edge.tsx';
import { StatementGallery, TableGallery } from '../ui/gallery-statements.tsx';
import { Both, Head, Page } from '../ui/page.tsx';
import { Shell } from '../ui/shell.tsx';

const NAV = [
  { to: '/parts', label: 'Parts' },
  { to: '/tasks', label: 'Tasks' },
  { to: '/disputes', label: 'Disputes', count: 5 },
  { to: '/standings', label: 'Standings' },
];

/** Every part in every state, for those who build with them. */
export function Component() {
  return (
    <Shell nav={NAV} who={{ name: 'Ilse Varga', place: '10C' }} foot="Brackenfell School · times are Berlin time">
      <Page>
        <Head where="for the developers" h1="Parts, in all their states" />
        <EdgeGallery />
        <Both>
          <ActionGallery />
          <FieldGallery />
          <SureGallery />
          <TableGallery />
          <StatementGallery />
        </Both>
      </Page>
    </Shell>
  );
}
