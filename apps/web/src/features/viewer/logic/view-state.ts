import type { Processing } from '@heddle/shared';
import type { Range } from './axis';
import type { TraceLayout } from './compare-traces';

export type Panel = 'processing' | 'peaks' | 'integrals' | 'lines' | 'report' | 'compare' | 'documents';
export const PANELS: readonly Panel[] = ['report', 'processing', 'peaks', 'integrals', 'lines', 'compare', 'documents'];

const LAYOUTS: readonly TraceLayout[] = ['overlay', 'stack', 'difference'];
/** Runs shown beside the first. */
export const MOST_BESIDE = 9;

/** What a reader has chosen to see of a run. It stands in the address, so that a link shows the same. */
export interface ViewState {
  readonly show: 'spectrum' | 'fid';
  /** Null shows all. */
  readonly range: Range | null;
  /** Vertical magnification. */
  readonly scale: number;
  readonly panel: Panel;
  /** Processing that differs from the run's own. */
  readonly processing: Partial<Processing>;
  /** Peaks are picked above this share of the highest point. */
  readonly threshold: number;
  readonly integrals: readonly Range[];
  /** The index of the region that integrals are normalised to, and the number of nuclei it is given. */
  readonly reference: { readonly index: number; readonly nuclei: number } | null;
  /** Ids of other runs drawn with this one, and how. */
  readonly beside: readonly string[];
  readonly layout: TraceLayout;
}

export const START_VIEW: ViewState = {
  show: 'spectrum',
  range: null,
  scale: 1,
  panel: 'report',
  processing: {},
  threshold: 0.05,
  integrals: [],
  reference: null,
  beside: [],
  layout: 'overlay',
};

const PROCESSING_KEYS = { lb: 'exponential', gb: 'gaussian', zf: 'zeroFill', p0: 'phase0', p1: 'phase1' } as const;

const short = (value: number) => String(+value.toPrecision(7));

/** The state as search parameters; what is as at the start is left out. */
export function writeView(view: ViewState): URLSearchParams {
  const params = new URLSearchParams();
  if (view.show !== 'spectrum') params.set('show', view.show);
  if (view.range) params.set('x', writeRange(view.range));
  if (view.scale !== 1) params.set('y', short(view.scale));
  if (view.panel !== START_VIEW.panel) params.set('panel', view.panel);
  for (const [name, key] of Object.entries(PROCESSING_KEYS)) {
    const value = view.processing[key];
    if (value !== undefined) params.set(name, short(value));
  }
  if (view.threshold !== START_VIEW.threshold) params.set('peaks', short(view.threshold));
  if (view.integrals.length > 0) params.set('int', view.integrals.map(writeRange).join(','));
  if (view.reference) params.set('ref', `${view.reference.index}:${short(view.reference.nuclei)}`);
  if (view.beside.length > 0) params.set('beside', view.beside.join(','));
  if (view.layout !== 'overlay') params.set('as', view.layout);
  return params;
}

/** Reads search parameters; whatever makes no sense is as at the start. */
export function readView(params: URLSearchParams): ViewState {
  const number = (name: string, sound: (value: number) => boolean): number | undefined => {
    const text = params.get(name);
    const value = Number(text);
    return text !== null && text.trim() !== '' && Number.isFinite(value) && sound(value) ? value : undefined;
  };
  const processing: Partial<Processing> = {};
  for (const [name, key] of Object.entries(PROCESSING_KEYS)) {
    const value = number(name, (v) =>
      key === 'zeroFill' ? Number.isInteger(v) && v >= 0 : key === 'gaussian' ? v >= 0 : true,
    );
    if (value !== undefined) processing[key] = value;
  }
  const integrals = (params.get('int') ?? '').split(',').flatMap((text) => readRange(text) ?? []);
  const [index, nuclei] = (params.get('ref') ?? '').split(':').map(Number);
  return {
    show: params.get('show') === 'fid' ? 'fid' : 'spectrum',
    range: readRange(params.get('x') ?? ''),
    scale: number('y', (v) => v > 0) ?? 1,
    panel: PANELS.find((panel) => panel === params.get('panel')) ?? START_VIEW.panel,
    processing,
    threshold: number('peaks', (v) => v > 0 && v < 1) ?? START_VIEW.threshold,
    integrals,
    reference: integrals[index] && nuclei > 0 ? { index, nuclei } : null,
    beside: (params.get('beside') ?? '')
      .split(',')
      .filter((id) => /^[0-9a-f-]{36}$/.test(id))
      .slice(0, MOST_BESIDE),
    layout: LAYOUTS.find((layout) => layout === params.get('as')) ?? 'overlay',
  };
}

function writeRange({ high, low }: Range): string {
  return `${short(high)}_${short(low)}`;
}

function readRange(text: string): Range | null {
  const [high, low, ...more] = text.split('_').map((part) => (part.trim() === '' ? NaN : Number(part)));
  return more.length === 0 && high > low ? { high, low } : null;
}
