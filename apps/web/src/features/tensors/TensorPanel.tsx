import { Button, Group, NativeSelect, Stack, Text, TextInput } from '@mantine/core';
import { useState } from 'react';
import {
  deltaEtaFromSpanSkew,
  principalFromSpanSkew,
  spanSkewFromDeltaEta,
  spanSkewFromPrincipal,
  type Euler,
  type SpinSystem,
} from '@heddle/shared';
import { traceStyle } from '../../theme/dyes';
import { useDyes } from '../../theme/useDyes';
import { drawnAxes } from './axes';

type Nucleus = SpinSystem['nuclei'][number];

const SIZE = 190;
const digits = (value: number) => String(+value.toPrecision(6));

/** What was typed as a tensor, seen and in the other notations, which can be typed as well. */
export function TensorPanel({
  system,
  onShift,
}: {
  system: SpinSystem | null;
  /** Sets the shift tensor of a nucleus, and its isotropic shift where the notation gives it. */
  onShift(id: string, values: { span: number; skew: number; iso?: number }): void;
}) {
  const [chosen, setChosen] = useState<string | null>(null);
  const nucleus =
    system?.nuclei.find(({ id }) => id === chosen) ??
    system?.nuclei.find(({ csa, quadrupole }) => csa ?? quadrupole) ??
    system?.nuclei[0];
  if (!system || !nucleus) return <Text c="dimmed">The tensors are drawn here when the system is sound.</Text>;
  return (
    <Group align="flex-start" gap="lg">
      <Stack gap={4}>
        <NativeSelect
          size="xs"
          label="Axes of"
          data={system.nuclei.map(({ id }) => id)}
          value={nucleus.id}
          onChange={({ currentTarget: { value } }) => setChosen(value)}
        />
        {nucleus.csa && <Axes euler={nucleus.csa.euler} name="Shift tensor" />}
        {nucleus.quadrupole && <Axes euler={nucleus.quadrupole.euler} name="Field gradient" />}
        {!nucleus.csa && !nucleus.quadrupole && (
          <Text size="sm" c="dimmed" maw={SIZE}>
            {nucleus.id} has no tensor yet.
          </Text>
        )}
      </Stack>
      <Notations
        key={`${nucleus.id}|${JSON.stringify(nucleus.csa)}|${nucleus.shift}`}
        nucleus={nucleus}
        onShift={onShift}
      />
    </Group>
  );
}

function Axes({ euler, name }: { euler: Euler; name: string }) {
  const dyes = useDyes();
  const { molecule, tensor } = drawnAxes(euler, SIZE);
  const middle = SIZE / 2;
  return (
    <figure style={{ margin: 0 }}>
      <svg
        width={SIZE}
        height={SIZE}
        role="img"
        aria-label={`${name}: X, Y, Z turned by ${euler.join(', ')} degrees from the molecule's x, y, z`}
        style={{ background: 'var(--fleece)', border: '1px solid var(--rule)' }}
        fontSize={12}
      >
        {molecule.map(({ name: axis, x, y }) => (
          <g key={axis}>
            <line x1={middle} y1={middle} x2={x} y2={y} stroke={dyes.edge} />
            <text x={x + 4} y={y - 4} fill={dyes.inkSoft}>
              {axis}
            </text>
          </g>
        ))}
        {tensor.map(({ name: axis, x, y, behind }, i) => (
          <g key={axis}>
            <line
              x1={middle}
              y1={middle}
              x2={x}
              y2={y}
              stroke={dyes[traceStyle(i).dye]}
              strokeWidth={3}
              strokeDasharray={behind ? '5 3' : undefined}
            />
            <text x={x + 4} y={y + 14} fill={dyes.ink} fontWeight={600}>
              {axis}
            </text>
          </g>
        ))}
      </svg>
      <figcaption>
        <Text size="xs" c="dimmed">
          {name}; dashed points away
        </Text>
      </figcaption>
    </figure>
  );
}

/** Principal values and Haeberlen's delta and eta of the shift tensor, each to read and to type. */
function Notations({
  nucleus,
  onShift,
}: {
  nucleus: Nucleus;
  onShift(id: string, values: { span: number; skew: number; iso?: number }): void;
}) {
  const csa = nucleus.csa ?? { span: 0, skew: 0 };
  const start = principalFromSpanSkew(nucleus.shift, csa);
  const haeberlen = deltaEtaFromSpanSkew(csa);
  const [principal, setPrincipal] = useState(start.map(digits));
  const [delta, setDelta] = useState(digits(haeberlen.delta));
  const [eta, setEta] = useState(digits(haeberlen.eta));
  const values = principal.map((text) => (text.trim() === '' ? NaN : Number(text)));
  const sound = values.every(Number.isFinite);
  const [d, e] = [Number(delta), Number(eta)];
  const etaSound = Number.isFinite(d) && delta.trim() !== '' && e >= 0 && e <= 1;
  return (
    <Stack gap="sm">
      <Group align="flex-end" gap="xs">
        {principal.map((text, i) => (
          <TextInput
            key={i}
            size="xs"
            w={92}
            label={['\u03b411, ppm', '\u03b422, ppm', '\u03b433, ppm'][i]}
            value={text}
            error={Number.isFinite(values[i]) ? undefined : 'a number'}
            onChange={({ currentTarget: { value } }) =>
              setPrincipal(principal.map((old, k) => (k === i ? value : old)))
            }
          />
        ))}
        <Button
          size="xs"
          variant="default"
          disabled={!sound}
          onClick={() => onShift(nucleus.id, spanSkewFromPrincipal(values as [number, number, number]))}
        >
          Take principal values
        </Button>
      </Group>
      <Group align="flex-end" gap="xs">
        <TextInput
          size="xs"
          w={140}
          label={'\u0394 = zz \u2212 iso, ppm'}
          value={delta}
          onChange={({ currentTarget: { value } }) => setDelta(value)}
        />
        <TextInput
          size="xs"
          w={92}
          label="eta"
          value={eta}
          error={e >= 0 && e <= 1 ? undefined : '0 to 1'}
          onChange={({ currentTarget: { value } }) => setEta(value)}
        />
        <Button
          size="xs"
          variant="default"
          disabled={!etaSound}
          onClick={() => onShift(nucleus.id, spanSkewFromDeltaEta({ delta: d, eta: e }))}
        >
          Take Haeberlen&apos;s values
        </Button>
      </Group>
      <Text size="xs" c="dimmed" maw={420}>
        Principal values may come in any order; they also set the isotropic shift. The angles turn x, y, z of
        Haeberlen&apos;s ordering by Rz(a) Ry(b) Rz(g).
      </Text>
    </Stack>
  );
}
