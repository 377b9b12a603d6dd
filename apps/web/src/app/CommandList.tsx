import { Kbd, Modal, Text, TextInput } from '@mantine/core';
import { useId, useState, type KeyboardEvent } from 'react';
import { SearchIcon } from '../components/icons';
import { keyNames, useAvailableCommands, useCommands, type Command } from '../lib/commands';
import classes from './CommandList.module.css';

/** Opens and closes the list. */
export const COMMAND_LIST = 'commands.list';

/** Every command of the screen in one list, found by typing. */
export function CommandList() {
  const available = useAvailableCommands();
  const [commands, setCommands] = useState<Command[] | null>(null);
  const toggle = () => setCommands((open) => (open ? null : available().filter(({ id }) => id !== COMMAND_LIST)));
  useCommands([{ id: COMMAND_LIST, label: 'Commands', shortcut: 'mod+K', run: toggle }]);
  return (
    <Modal
      opened={commands !== null}
      onClose={() => setCommands(null)}
      withCloseButton={false}
      centered={false}
      yOffset="12vh"
      padding={0}
      size={560}
      attributes={{ content: { 'aria-label': 'Commands' } }}
    >
      {commands && <Choices commands={commands} close={() => setCommands(null)} />}
    </Modal>
  );
}

function Choices({ commands, close }: { commands: Command[]; close: () => void }) {
  const [text, setText] = useState('');
  const [position, setPosition] = useState(0);
  const listId = useId();
  const found = commands.filter(({ label }) => matches(label, text));
  const chosen = Math.min(position, found.length - 1);
  const run = (command: Command | undefined) => {
    if (!command) return;
    close();
    command.run();
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (step) setPosition((chosen + step + found.length) % Math.max(1, found.length));
    else if (event.key === 'Enter') run(found[chosen]);
    else return;
    event.preventDefault();
  };
  return (
    <>
      <TextInput
        data-autofocus
        size="md"
        variant="unstyled"
        px="md"
        placeholder="What do you want to do?"
        aria-label="Find a command"
        role="combobox"
        aria-expanded
        aria-controls={listId}
        aria-activedescendant={found.length ? `${listId}-${chosen}` : undefined}
        leftSection={<SearchIcon />}
        value={text}
        onChange={(event) => {
          setText(event.currentTarget.value);
          setPosition(0);
        }}
        onKeyDown={onKeyDown}
      />
      <ul id={listId} role="listbox" aria-label="Commands" className={classes.list}>
        {found.map((command, index) => (
          <li
            key={command.id}
            id={`${listId}-${index}`}
            role="option"
            aria-selected={index === chosen}
            className={classes.option}
            ref={(element) => {
              if (index === chosen) element?.scrollIntoView({ block: 'nearest' });
            }}
            onMouseMove={() => setPosition(index)}
            onClick={() => run(command)}
          >
            {command.label}
            {command.shortcut && (
              <span>
                {keyNames(command.shortcut).map((key) => (
                  <Kbd key={key} size="xs" ml={4}>
                    {key}
                  </Kbd>
                ))}
              </span>
            )}
          </li>
        ))}
      </ul>
      {found.length === 0 && (
        <Text px="md" pb="md" c="dimmed" role="status">
          No command on this screen has that name.
        </Text>
      )}
    </>
  );
}

/** Every word typed starts a word of the label or stands within it. */
function matches(label: string, text: string): boolean {
  const lower = label.toLowerCase();
  return text
    .toLowerCase()
    .split(/\s+/)
    .every((word) => lower.includes(word));
}
