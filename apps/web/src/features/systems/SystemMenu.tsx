import { ActionIcon, Menu } from '@mantine/core';
import type { System } from '../../api/types';
import { ArchiveIcon, CopyIcon, MoreIcon, PrivateIcon, RestoreIcon, SharedIcon } from '../../components/icons';
import { useSession } from '../../lib/session';
import { useSystemActions } from './useSystemActions';

/** What can be done with one system of the list. Only its owner changes it; everybody who sees it may copy it. */
export function SystemMenu({ labId, system }: { labId: string; system: System }) {
  const { user } = useSession();
  const { duplicate, change } = useSystemActions(labId);
  return (
    <Menu position="bottom-end">
      <Menu.Target>
        <ActionIcon aria-label={`Actions for ${system.name}`}>
          <MoreIcon />
        </ActionIcon>
      </Menu.Target>
      <Menu.Dropdown>
        <Menu.Item leftSection={<CopyIcon />} onClick={() => duplicate(system)}>
          Duplicate
        </Menu.Item>
        {system.owner.id === user.id && (
          <>
            <Menu.Item
              leftSection={system.shared ? <PrivateIcon /> : <SharedIcon />}
              onClick={() => change(system, { shared: !system.shared })}
            >
              {system.shared ? 'Make private' : 'Share with the lab'}
            </Menu.Item>
            <Menu.Item
              leftSection={system.archived ? <RestoreIcon /> : <ArchiveIcon />}
              onClick={() => change(system, { archived: !system.archived })}
            >
              {system.archived ? 'Bring back' : 'Archive'}
            </Menu.Item>
          </>
        )}
      </Menu.Dropdown>
    </Menu>
  );
}
