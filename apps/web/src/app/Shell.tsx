import { Container } from '@mantine/core';
import { useEffect, useRef } from 'react';
import { Outlet, ScrollRestoration, useLocation, useMatches, useNavigation, useNavigate } from 'react-router-dom';
import { useCommands } from '../lib/commands';
import { CommandList } from './CommandList';
import { Header } from './Header';
import classes from './Shell.module.css';
import { useSignOut } from './useSignOut';

/** The frame of every page: header, and one main landmark that the skip link and a change of page lead to. */
export function Shell() {
  const main = useFocusOnNewPage();
  const navigate = useNavigate();
  const signOut = useSignOut();
  const loading = useNavigation().state === 'loading';
  useCommands([
    { id: 'go.account', label: 'Go to Account', run: () => void navigate('/account') },
    { id: 'session.sign-out', label: 'Sign out', run: signOut },
  ]);
  return (
    <div className={classes.shell}>
      <a href="#main" className={classes.skip}>
        Skip to the page
      </a>
      <Header />
      <div className={classes.loading} data-loading={loading || undefined} aria-hidden="true" />
      <main id="main" ref={main} tabIndex={-1} className={classes.main}>
        <PageWidth />
      </main>
      <CommandList />
      <ScrollRestoration />
    </div>
  );
}

/** Benches (the editor, the viewer) use the whole width; other pages keep a readable one. */
function PageWidth() {
  const wide = useMatches().some(({ pathname }) => /\/(systems|runs)\/[^/]+$/.test(pathname));
  if (wide) return <Outlet />;
  return (
    <Container size={1200} py="xl" px="lg" w="100%">
      <Outlet />
    </Container>
  );
}

/** Moves the focus to the page when its address changes, so that a screen reader starts there. */
function useFocusOnNewPage() {
  const main = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  const shown = useRef(pathname);
  useEffect(() => {
    if (shown.current !== pathname) main.current?.focus({ preventScroll: true });
    shown.current = pathname;
  }, [pathname]);
  return main;
}
