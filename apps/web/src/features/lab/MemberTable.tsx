import { Button, Select } from '@mantine/core';
import { modals } from '@mantine/modals';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';
import type { Member, Role } from '../../api/types';
import { ListTable, Row, type Column } from '../../components/ListTable';
import { When } from '../../components/When';
import { notifyDone, notifyFailure } from '../../lib/forms';
import { ROLES } from '../../lib/roles';
import { useSession } from '../../lib/session';

const COLUMNS: readonly Column[] = [
  { label: 'Name' },
  { label: 'E-mail', from: 'md', width: '32%' },
  { label: 'Role', width: '150px' },
  { label: 'Since', from: 'lg', width: '130px' },
];
const MANAGED: readonly Column[] = [...COLUMNS, { label: 'Actions', hidden: true, width: '92px' }];

interface Props {
  labId: string;
  members: Member[] | undefined;
  /** Whether roles may be changed and members removed. */
  manage: boolean;
}

export function MemberTable({ labId, members, manage }: Props) {
  const { user } = useSession();
  const { setRole, remove } = useMemberActions(labId);
  const columns = manage ? MANAGED : COLUMNS;
  return (
    <ListTable label="Members" columns={columns} loading={!members}>
      {members?.map((member) => (
        <Row
          key={member.id}
          columns={columns}
          cells={[
            <span title={member.name}>
              {member.name}
              {member.userId === user.id && ' (you)'}
            </span>,
            <span title={member.email}>{member.email}</span>,
            manage ? (
              <Select
                aria-label={`Role of ${member.name}`}
                size="xs"
                data={ROLES.map(({ value, label }) => ({ value, label }))}
                allowDeselect={false}
                value={member.role}
                onChange={(role) => role && setRole(member, role)}
              />
            ) : (
              ROLES.find(({ value }) => value === member.role)?.label
            ),
            <When iso={member.joinedAt} />,
            <Button
              variant="subtle"
              color="madder"
              size="compact-sm"
              aria-label={`Remove ${member.name}`}
              onClick={() => remove(member)}
            >
              Remove
            </Button>,
          ]}
        />
      ))}
    </ListTable>
  );
}

function useMemberActions(labId: string) {
  const queryClient = useQueryClient();
  const onSettled = () => queryClient.invalidateQueries({ queryKey: keys.members(labId) });
  const path = (member: Member) => ({ params: { path: { labId, memberId: member.id } } });
  const setRole = useMutation({
    mutationFn: ({ member, role }: { member: Member; role: Role }) =>
      unwrap(client.PATCH('/api/labs/{labId}/members/{memberId}', { ...path(member), body: { role } })),
    onSuccess: (_, { member, role }) => notifyDone(`${member.name} is ${role} now.`),
    onError: (error) => notifyFailure('The role is as it was', error),
    onSettled,
  });
  const remove = useMutation({
    mutationFn: (member: Member) => unwrap(client.DELETE('/api/labs/{labId}/members/{memberId}', path(member))),
    onSuccess: (_, member) => notifyDone(`${member.name} has left the laboratory.`),
    onError: (error) => notifyFailure('Not removed', error),
    onSettled,
  });
  return {
    setRole: (member: Member, role: Role) => setRole.mutate({ member, role }),
    remove: (member: Member) =>
      modals.openConfirmModal({
        title: `Remove ${member.name}?`,
        children: 'They lose access at once. What they shared stays in the laboratory.',
        labels: { confirm: 'Remove', cancel: 'Cancel' },
        confirmProps: { color: 'madder' },
        onConfirm: () => remove.mutate(member),
      }),
  };
}
