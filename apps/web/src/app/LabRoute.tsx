import { useEffect } from 'react';
import { Outlet, useNavigate, useParams } from 'react-router-dom';
import { useCommands } from '../lib/commands';
import { useLabEvents } from '../lib/events';
import { rememberLab, useSession } from '../lib/session';
import { NotFound } from './NotFound';
import { LAB_PAGES } from './lab-pages';

/** Pages of one laboratory, for its members only. */
export function LabRoute() {
  const { labId = '' } = useParams();
  const member = useSession().memberships.some((lab) => lab.labId === labId);
  return member ? <OpenLab key={labId} labId={labId} /> : <NotFound what="laboratory" />;
}

function OpenLab({ labId }: { labId: string }) {
  const navigate = useNavigate();
  useLabEvents(labId);
  useEffect(() => rememberLab(labId), [labId]);
  useCommands([
    {
      id: 'system.new',
      label: 'New system',
      shortcut: 'alt+N',
      run: () => void navigate(`/labs/${labId}/systems/new`),
    },
    ...LAB_PAGES.map(({ path, label }) => ({
      id: `go.${path}`,
      label: `Go to ${label}`,
      run: () => void navigate(`/labs/${labId}/${path}`),
    })),
  ]);
  return <Outlet />;
}
