import {
  Menu,
  SegmentedControl,
  Text,
  useMantineColorScheme,
  VisuallyHidden,
  type MantineColorScheme,
} from '@mantine/core';
import { Link, NavLink, useNavigate, useParams } from 'react-router-dom';
import { ChevronDownIcon, MenuIcon, SearchIcon } from '../components/icons';
import { keyNames, useRunCommand } from '../lib/commands';
import { homeLab, useSession } from '../lib/session';
import { Mark } from '../theme/Mark';
import { COMMAND_LIST } from './CommandList';
import { LAB_PAGES } from './lab-pages';
import classes from './Shell.module.css';
import { useSignOut } from './useSignOut';

export function Header() {
  const session = useSession();
  const { labId } = useParams();
  const runCommand = useRunCommand();
  const lab = session.memberships.find((each) => each.labId === labId) ?? homeLab(session);
  return (
    <header className={classes.header}>
      <div className={classes.bar}>
        {lab && <SmallNavigation labId={lab.labId} />}
        <Link to="/" className={classes.brand} aria-label="Heddle, Today">
          <Mark />
          <span>Heddle</span>
        </Link>
        {lab && (
          <nav aria-label="Laboratory" className={classes.nav}>
            {LAB_PAGES.map(({ path, label }) => (
              <NavLink key={path} to={`/labs/${lab.labId}/${path}`} className={classes.link}>
                {label}
              </NavLink>
            ))}
          </nav>
        )}
        <div className={classes.end}>
          <button
            type="button"
            className={classes.finder}
            onClick={() => runCommand(COMMAND_LIST)}
            aria-label="Find a command"
          >
            <SearchIcon />
            <span>Commands</span>
            <span>{keyNames('mod+K').join(' ')}</span>
          </button>
          {lab && <LabSwitcher current={lab.labId} name={lab.labName} />}
          <PersonMenu name={session.user.name} email={session.user.email} />
        </div>
      </div>
      <div className={`warp ${classes.band}`} />
    </header>
  );
}

function SmallNavigation({ labId }: { labId: string }) {
  return (
    <Menu position="bottom-start">
      <Menu.Target>
        <button type="button" className={`${classes.plain} ${classes.burger}`} aria-label="Pages">
          <MenuIcon />
        </button>
      </Menu.Target>
      <Menu.Dropdown>
        {LAB_PAGES.map(({ path, label }) => (
          <Menu.Item key={path} component={Link} to={`/labs/${labId}/${path}`}>
            {label}
          </Menu.Item>
        ))}
      </Menu.Dropdown>
    </Menu>
  );
}

/** Name of the laboratory; a menu when there is another one to go to. */
function LabSwitcher({ current, name }: { current: string; name: string }) {
  const navigate = useNavigate();
  const { memberships } = useSession();
  if (memberships.length < 2) {
    return (
      <Text size="sm" c="dimmed" className={classes.name} title={name}>
        {name}
      </Text>
    );
  }
  return (
    <Menu position="bottom-end">
      <Menu.Target>
        <button type="button" className={classes.plain} title={name}>
          <VisuallyHidden>Laboratory: </VisuallyHidden>
          <span className={classes.name}>{name}</span>
          <ChevronDownIcon size={12} />
        </button>
      </Menu.Target>
      <Menu.Dropdown>
        {memberships.map((lab) => (
          <Menu.Item
            key={lab.labId}
            aria-current={lab.labId === current || undefined}
            fw={lab.labId === current ? 600 : undefined}
            onClick={() => void navigate(`/labs/${lab.labId}/today`)}
          >
            {lab.labName}{' '}
            <Text span size="xs" c="dimmed" fw={400}>
              {lab.role}
            </Text>
          </Menu.Item>
        ))}
      </Menu.Dropdown>
    </Menu>
  );
}

const SCHEMES: { value: MantineColorScheme; label: string }[] = [
  { value: 'auto', label: 'System' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
];

function PersonMenu({ name, email }: { name: string; email: string }) {
  const { colorScheme, setColorScheme } = useMantineColorScheme();
  const signOut = useSignOut();
  return (
    <Menu position="bottom-end" width={240}>
      <Menu.Target>
        <button type="button" className={classes.plain} title={name}>
          <span className={classes.name}>{name}</span>
          <ChevronDownIcon size={12} />
        </button>
      </Menu.Target>
      <Menu.Dropdown>
        <Menu.Label>{email}</Menu.Label>
        <Menu.Item component={Link} to="/account">
          Account
        </Menu.Item>
        <Menu.Divider />
        <Menu.Label>Appearance</Menu.Label>
        <SegmentedControl
          aria-label="Appearance"
          fullWidth
          size="xs"
          mx="xs"
          mb="xs"
          data={SCHEMES}
          value={colorScheme}
          onChange={(value) => setColorScheme(value)}
        />
        <Menu.Divider />
        <Menu.Item onClick={signOut}>Sign out</Menu.Item>
      </Menu.Dropdown>
    </Menu>
  );
}
