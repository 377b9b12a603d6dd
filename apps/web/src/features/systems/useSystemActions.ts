import { useMutation, useQueryClient } from '@tanstack/react-query';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';
import type { System } from '../../api/types';
import { notifyDone, notifyFailure } from '../../lib/forms';

type Change = { shared: boolean } | { archived: boolean };

/** Changes made from the list; the list is read again after each. */
export function useSystemActions(labId: string) {
  const queryClient = useQueryClient();
  const onSettled = () => queryClient.invalidateQueries({ queryKey: keys.systems(labId) });
  const duplicate = useMutation({
    mutationFn: (system: System) =>
      unwrap(client.POST('/api/labs/{labId}/systems/{id}/duplicate', { params: { path: { labId, id: system.id } } })),
    onSuccess: (copy) => notifyDone(`${copy.name} is in the list, private to you.`),
    onError: (error) => notifyFailure('Not duplicated', error),
    onSettled,
  });
  const change = useMutation({
    mutationFn: ({ system, what }: { system: System; what: Change }) =>
      unwrap(
        client.PATCH('/api/labs/{labId}/systems/{id}', {
          params: { path: { labId, id: system.id } },
          body: { version: system.version, ...what },
        }),
      ),
    onSuccess: (system, { what }) => notifyDone(said(system.name, what)),
    onError: (error) => notifyFailure('Not changed', error),
    onSettled,
  });
  return {
    duplicate: (system: System) => duplicate.mutate(system),
    change: (system: System, what: Change) => change.mutate({ system, what }),
  };
}

function said(name: string, what: Change): string {
  if ('shared' in what) return what.shared ? `${name} is shared with the lab.` : `${name} is private to its owner.`;
  return what.archived ? `${name} is archived.` : `${name} is back in the list.`;
}
