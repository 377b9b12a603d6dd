import { Anchor, Text } from '@mantine/core';
import { Link } from 'react-router-dom';
import type { System } from '../../api/types';
import { Isotopes } from '../../components/Isotope';
import { When } from '../../components/When';
import classes from './RecentSystems.module.css';

/** The systems one worked on last, as a short list. */
export function RecentSystems({ labId, systems }: { labId: string; systems: System[] }) {
  if (systems.length === 0) return <Text c="dimmed">Nothing yet.</Text>;
  return (
    <ul className={classes.list}>
      {systems.map((system) => (
        <li key={system.id} className={classes.item}>
          <Anchor
            component={Link}
            to={`/labs/${labId}/systems/${system.id}`}
            title={system.name}
            className={classes.name}
          >
            {system.name}
          </Anchor>
          <span className={classes.nuclides}>
            <Isotopes names={system.nuclides} />
          </span>
          <span className={classes.when}>
            rev. {system.latestRevision}, <When iso={system.updatedAt} />
          </span>
        </li>
      ))}
    </ul>
  );
}
