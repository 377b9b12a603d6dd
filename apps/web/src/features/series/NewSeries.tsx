import { Button, Group, Modal, NativeSelect, Stack, Switch, Text, Textarea, TextInput } from '@mantine/core';
import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { spread, VARIED, varied, VARIED_UNITS, type Experiment, type SpinSystem, type Varied } from '@heddle/shared';
import { client, unwrap } from '../../api/client';
import { notifyFailure } from '../../lib/forms';
import { QUANTITY_WORDS, readValues, targetsOf } from './logic/words';

const MOST = 60;

/** Asks along what a series of runs shall go, and queues it. */
export function NewSeries({
  labId,
  system,
  experiment,
  saveFirst,
  onClose,
}: {
  labId: string;
  system: SpinSystem;
  experiment: Experiment;
  saveFirst(): Promise<{ systemId: string; revision: number }>;
  onClose(): void;
}) {
  const navigate = useNavigate();
  const offered = VARIED.filter((quantity) => varied(system, experiment, { quantity }, 1) !== null);
  const [quantity, setQuantity] = useState<Varied>(system.exchange?.length ? 'rate' : 'field');
  const targets = targetsOf(system, quantity);
  const [target, setTarget] = useState<string | undefined>(targets[0]);
  const [text, setText] = useState(quantity === 'rate' ? '1 10 50 100 300 1000 10000' : '60 100 200 400 600 800');
  const values = readValues(text);
  const error =
    values === null
      ? 'write numbers, apart by blanks'
      : values.length < 2
        ? 'give at least two values'
        : values.length > MOST
          ? `at most ${MOST} values`
          : null;
  const make = useMutation({
    mutationFn: async () => {
      const saved = await saveFirst();
      const vary = { quantity, values: values!, ...(targets.length > 0 && { target: target ?? targets[0] }) };
      const name = `${system.name} along ${QUANTITY_WORDS[quantity]}`;
      return unwrap(
        client.POST('/api/labs/{labId}/series', {
          params: { path: { labId } },
          body: { name, ...saved, experiment: { ...experiment }, vary },
        }),
      );
    },
    onSuccess: async ({ id }) => navigate(`/labs/${labId}/series/${id}`),
    onError: (problem) => notifyFailure('Not queued', problem),
  });
  return (
    <Modal opened onClose={onClose} title="Series of runs" size="lg">
      <Stack gap="sm">
        <Group grow align="flex-start">
          <NativeSelect
            label="Along"
            data={offered.map((value) => ({ value, label: QUANTITY_WORDS[value] }))}
            value={quantity}
            onChange={({ currentTarget: { value } }) => {
              setQuantity(value as Varied);
              setTarget(targetsOf(system, value as Varied)[0]);
            }}
          />
          {targets.length > 0 && (
            <NativeSelect
              label="Of"
              data={targets.map((value) => ({
                value,
                label: value.replace(',', quantity === 'rate' ? ' to ' : '\u2013'),
              }))}
              value={target}
              onChange={({ currentTarget: { value } }) => setTarget(value)}
            />
          )}
        </Group>
        <Textarea
          label={`Values, ${VARIED_UNITS[quantity]}`}
          autosize
          value={text}
          error={error}
          onChange={({ currentTarget: { value } }) => setText(value)}
        />
        <Spread onFill={(filled) => setText(filled.join(' '))} />
        <Group justify="space-between">
          <Text size="sm" c="dimmed">
            {values && !error ? `${values.length} runs` : ''}
          </Text>
          <Button onClick={() => make.mutate()} disabled={error !== null} loading={make.isPending}>
            Queue the series
          </Button>
        </Group>
      </Stack>
    </Modal>
  );
}

/** Fills in evenly spread values. */
function Spread({ onFill }: { onFill(values: number[]): void }) {
  const [from, setFrom] = useState('');
  const [to, setTo] = useState('');
  const [count, setCount] = useState('8');
  const [ratios, setRatios] = useState(false);
  const [a, b, n] = [Number(from), Number(to), Number(count)];
  const sound =
    from !== '' &&
    to !== '' &&
    Number.isFinite(a + b) &&
    Number.isInteger(n) &&
    n >= 2 &&
    n <= MOST &&
    (!ratios || a * b > 0);
  return (
    <Group align="flex-end" gap="xs">
      <TextInput
        size="xs"
        w={90}
        label="From"
        value={from}
        onChange={({ currentTarget: { value } }) => setFrom(value)}
      />
      <TextInput size="xs" w={90} label="To" value={to} onChange={({ currentTarget: { value } }) => setTo(value)} />
      <TextInput
        size="xs"
        w={70}
        label="How many"
        value={count}
        onChange={({ currentTarget: { value } }) => setCount(value)}
      />
      <Switch
        size="xs"
        pb={8}
        label="Equal ratios"
        checked={ratios}
        onChange={({ currentTarget: { checked } }) => setRatios(checked)}
      />
      <Button size="xs" variant="default" disabled={!sound} onClick={() => onFill(spread(a, b, n, ratios))}>
        Fill in
      </Button>
    </Group>
  );
}
