import { useQuery } from '@tanstack/react-query';
import { NavLink, Outlet } from 'react-router-dom';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';
import { PageHeader } from '../../components/PageHeader';
import { mayManage, maySeeWorkers } from '../../lib/roles';
import { useLab } from '../../lib/session';
import classes from './LabLayout.module.css';
import { RenameLab } from './RenameLab';

/** The laboratory itself: who is in it and what computes for it. */
export function LabLayout() {
  const { labId, labName, role } = useLab();
  const { data: lab } = useQuery({
    queryKey: [...keys.lab(labId), 'itself'],
    queryFn: () => unwrap(client.GET('/api/labs/{labId}', { params: { path: { labId } } })),
    enabled: mayManage(role),
  });
  return (
    <>
      <PageHeader
        title={labName}
        lead={`You are ${role === 'admin' || role === 'instructor' ? 'an' : 'a'} ${role} here.`}
        actions={lab && <RenameLab lab={lab} />}
      />
      {maySeeWorkers(role) && (
        <nav aria-label="Parts of the laboratory" className={classes.tabs}>
          <NavLink to={`/labs/${labId}/members`}>Members</NavLink>
          <NavLink to={`/labs/${labId}/workers`}>Workers</NavLink>
        </nav>
      )}
      <Outlet />
    </>
  );
}
