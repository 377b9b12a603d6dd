import { useQuery } from '@tanstack/react-query';
import { membersQuery } from '../../api/queries';
import { Refusal } from '../../components/Refusal';
import { Section } from '../../components/Section';
import { mayManage } from '../../lib/roles';
import { useLab } from '../../lib/session';
import { Invitations } from './Invitations';
import { MemberTable } from './MemberTable';

/** Who is in the laboratory and who was asked to join it. */
export function MembersPage() {
  const { labId, role } = useLab();
  const { data, error, refetch } = useQuery(membersQuery(labId));
  const manage = mayManage(role);
  return (
    <>
      <Section
        title="Members"
        lead={manage ? 'One role each. Leaving a lab keeps what a member shared in it.' : undefined}
      >
        {error ? (
          <Refusal error={error} retry={() => void refetch()} />
        ) : (
          <MemberTable labId={labId} members={data?.items} manage={manage} />
        )}
      </Section>
      {manage && <Invitations labId={labId} />}
    </>
  );
}
