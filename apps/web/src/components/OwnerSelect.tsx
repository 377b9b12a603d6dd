import { Select } from '@mantine/core';
import { useQuery } from '@tanstack/react-query';
import { membersQuery } from '../api/queries';
import { useLab, useSession } from '../lib/session';

/** Filter by whose something is; oneself first. */
export function OwnerSelect({ value, onChange }: { value: string | null; onChange: (userId: string | null) => void }) {
  const { labId } = useLab();
  const { user } = useSession();
  const { data } = useQuery(membersQuery(labId));
  const others = (data?.items ?? []).filter((member) => member.userId !== user.id);
  return (
    <Select
      aria-label="Owner"
      placeholder="Anybody’s"
      data={[{ value: user.id, label: 'Mine' }, ...others.map(({ userId, name }) => ({ value: userId, label: name }))]}
      searchable
      clearable
      value={value}
      onChange={onChange}
      w={170}
    />
  );
}
