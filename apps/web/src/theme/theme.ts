import {
  ActionIcon,
  Anchor,
  Badge,
  Button,
  createTheme,
  Input,
  Modal,
  Notification,
  Progress,
  Skeleton,
  type CSSVariablesResolver,
  type MantineColorsTuple,
} from '@mantine/core';
import { DYE_COLOURS, SURFACES, type Scheme } from './dyes';

/** Ramps from wool to ink through a dye; entry 4 is the dye of the dark scheme, entry 7 of the light one. */
const ramps: Record<string, MantineColorsTuple> = {
  indigo: [
    '#f0f0f1',
    '#e3e5f1',
    '#cbd0f1',
    '#adb7f0',
    '#8c9bf0',
    '#6472c1',
    '#404f98',
    '#27357a',
    '#232e63',
    '#1f2851',
  ],
  madder: [
    '#f8ece5',
    '#f6dbd3',
    '#f2bbb2',
    '#ee9488',
    '#e9695b',
    '#cf5347',
    '#b84036',
    '#a8322a',
    '#832c27',
    '#662625',
  ],
  weld: ['#f8f3e5', '#f6eed3', '#f2e5b2', '#edd887', '#e8cb5a', '#cdab36', '#b49017', '#a37c00', '#806308', '#634f0e'],
  woad: ['#eff4ef', '#e1efed', '#c6e7e9', '#a4dce4', '#7fd0de', '#5db0c2', '#3f93aa', '#2a7f98', '#25657a', '#215162'],
};

/** Mantine's greys, as wool in the light scheme and ink in the dark one. */
const gray: MantineColorsTuple = [
  '#f9f7f1',
  '#efebe1',
  '#e5dfd1',
  '#d9d2c1',
  '#cfc7b5',
  '#a39d8d',
  '#66624f',
  '#575449',
  '#34353a',
  '#1b1f2a',
];
const dark: MantineColorsTuple = [
  '#e9e4d8',
  '#d3cfc4',
  '#aba799',
  '#8c8e97',
  '#454b5a',
  '#363c4a',
  '#1d212b',
  '#15181f',
  '#101319',
  '#0b0d12',
];

const sans = "'Plex Sans', system-ui, sans-serif";
const serif = "'Plex Serif', 'Plex Sans', Georgia, serif";

export const theme = createTheme({
  colors: { ...ramps, gray, dark },
  primaryColor: 'indigo',
  primaryShade: { light: 7, dark: 4 },
  autoContrast: true,
  luminanceThreshold: 0.35,
  black: SURFACES.light.ink,
  white: SURFACES.light.fleece,
  fontFamily: sans,
  fontFamilyMonospace: "ui-monospace, 'Cascadia Mono', 'DejaVu Sans Mono', monospace",
  headings: { fontFamily: serif, fontWeight: '400' },
  defaultRadius: 2,
  cursorType: 'pointer',
  respectReducedMotion: true,
  focusRing: 'auto',
  components: {
    Button: Button.extend({ defaultProps: { size: 'sm' }, styles: { label: { fontWeight: 500 } } }),
    ActionIcon: ActionIcon.extend({ defaultProps: { variant: 'subtle', color: 'gray' } }),
    Anchor: Anchor.extend({ defaultProps: { underline: 'hover' } }),
    Badge: Badge.extend({ defaultProps: { variant: 'outline', tt: 'none' } }),
    InputWrapper: Input.Wrapper.extend({
      defaultProps: { inputWrapperOrder: ['label', 'description', 'input', 'error'] },
    }),
    Modal: Modal.extend({ defaultProps: { centered: true, closeButtonProps: { 'aria-label': 'Close' } } }),
    Notification: Notification.extend({ defaultProps: { closeButtonProps: { 'aria-label': 'Dismiss' } } }),
    Progress: Progress.extend({ defaultProps: { radius: 0 } }),
    Skeleton: Skeleton.extend({ defaultProps: { radius: 2 } }),
  },
});

function schemeVariables(scheme: Scheme): Record<string, string> {
  const surfaces = SURFACES[scheme];
  const dyes = DYE_COLOURS[scheme];
  return {
    '--wool': surfaces.wool,
    '--fleece': surfaces.fleece,
    '--felt': surfaces.felt,
    '--ink': surfaces.ink,
    '--ink-soft': surfaces.inkSoft,
    '--edge': surfaces.edge,
    '--rule': surfaces.rule,
    '--indigo': dyes.indigo,
    '--madder': dyes.madder,
    '--weld': dyes.weld,
    '--woad': dyes.woad,
    '--mantine-color-body': surfaces.wool,
    '--mantine-color-text': surfaces.ink,
    '--mantine-color-dimmed': surfaces.inkSoft,
    '--mantine-color-placeholder': surfaces.inkSoft,
    '--mantine-color-error': dyes.madder,
    '--mantine-color-anchor': dyes.indigo,
    '--mantine-color-default': surfaces.fleece,
    '--mantine-color-default-hover': surfaces.felt,
    '--mantine-color-default-color': surfaces.ink,
    '--mantine-color-default-border': surfaces.edge,
  };
}

/** Offers the colours of `dyes.ts` to style sheets, as `var(--wool)`, `var(--madder)` and so on. */
export const cssVariables: CSSVariablesResolver = () => ({
  variables: {},
  light: schemeVariables('light'),
  dark: schemeVariables('dark'),
});
