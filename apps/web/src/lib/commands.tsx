import { getHotkeyHandler } from '@mantine/hooks';
import { createContext, useContext, useEffect, useRef, useState, type ReactNode } from 'react';

/**
 * What can be done on a screen, as data: the command list shows it, its shortcut runs it. A screen registers its commands
 * with `useCommands`; they leave with the screen.
 */
export interface Command {
  /** Dotted, unique while registered: 'system.save'. */
  id: string;
  label: string;
  /** Like 'mod+S' or 'mod+shift+D'; always with mod or alt, so that it never gets in the way of typing. */
  shortcut?: string;
  /** Left out means always. */
  canRun?: () => boolean;
  run: () => void;
}

/** The commands of one screen, as of its last render. */
type Source = { current: readonly Command[] };

class CommandRegistry {
  private readonly sources = new Set<Source>();

  add(source: Source): () => void {
    this.sources.add(source);
    return () => this.sources.delete(source);
  }

  /** Those that can run now, the screen's own before the shell's. */
  available(): Command[] {
    return [...this.sources]
      .reverse()
      .flatMap((source) => source.current)
      .filter((command) => command.canRun?.() ?? true);
  }
}

const RegistryContext = createContext<CommandRegistry | null>(null);

function useRegistry(): CommandRegistry {
  const registry = useContext(RegistryContext);
  if (!registry) throw new Error('commands need a CommandsProvider above');
  return registry;
}

/** Holds the commands of the screens below and listens for their shortcuts. */
export function CommandsProvider({ children }: { children: ReactNode }) {
  const [registry] = useState(() => new CommandRegistry());

  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented) return;
      const bindings = registry
        .available()
        .flatMap(({ shortcut, run }) => (shortcut ? [[shortcut, run] as [string, () => void]] : []));
      getHotkeyHandler(bindings)(event);
    };
    document.addEventListener('keydown', onKeyDown);
    return () => document.removeEventListener('keydown', onKeyDown);
  }, [registry]);

  return <RegistryContext value={registry}>{children}</RegistryContext>;
}

/** Offers `commands` while the calling component is on the screen. The array may be a new one on each render. */
export function useCommands(commands: readonly Command[]): void {
  const registry = useRegistry();
  const source = useRef(commands);
  useEffect(() => {
    source.current = commands;
  });
  useEffect(() => registry.add(source), [registry]);
}

/** Reads the commands that can run now; call it when the list opens. */
export function useAvailableCommands(): () => Command[] {
  const registry = useRegistry();
  return () => registry.available();
}

/** Runs the command with an id, if it is there and can run: for buttons that do what a command does. */
export function useRunCommand(): (id: string) => void {
  const registry = useRegistry();
  return (id) =>
    registry
      .available()
      .find((command) => command.id === id)
      ?.run();
}

const MAC = navigator.platform.startsWith('Mac');
const KEY_NAMES: Record<string, string> = MAC
  ? { mod: '⌘', shift: '⇧', alt: '⌥' }
  : { mod: 'Ctrl', shift: 'Shift', alt: 'Alt' };

/** The keys of a shortcut as they are printed on this machine's keyboard. */
export function keyNames(shortcut: string): string[] {
  return shortcut.split('+').map((key) => KEY_NAMES[key.toLowerCase()] ?? (key.length === 1 ? key.toUpperCase() : key));
}
