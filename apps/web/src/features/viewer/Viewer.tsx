import { Button, Group, SegmentedControl, Tabs, Text } from '@mantine/core';
import { useMemo, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { fidToSpectrum, larmorMHz, type Spectrum } from '@heddle/shared';
import { useQueries } from '@tanstack/react-query';
import type { Run } from '../../api/types';
import { useCommands } from '../../lib/commands';
import { useDyes } from '../../theme/useDyes';
import { LeftOut } from '../report/LeftOut';
import { ComparePanel } from './panels/ComparePanel';
import { DocumentsPanel } from './panels/DocumentsPanel';
import { IntegralsPanel } from './panels/IntegralsPanel';
import { LinesPanel } from './panels/LinesPanel';
import { PeaksPanel } from './panels/PeaksPanel';
import { ProcessingPanel } from './panels/ProcessingPanel';
import { copySvg, savePng, saveSvg } from './copies';
import { fullRange, narrowest, type Range } from './logic/axis';
import { stackTraces, type ShownTrace } from './logic/compare-traces';
import { heights } from './logic/hover';
import { integrate, runningIntegral } from './logic/integrals';
import { pickPeaks } from './logic/peaks';
import { PANELS, readView, writeView, type Panel, type ViewState } from './logic/view-state';
import { SpectrumPlot, type PlotTrace } from './plot/SpectrumPlot';
import { resultQuery, type RunResult } from './result';
import classes from './Viewer.module.css';

const PANEL_NAMES: Record<Panel, string> = {
  report: 'What it leaves out',
  processing: 'Processing',
  peaks: 'Peaks',
  integrals: 'Integrals',
  lines: 'Lines',
  compare: 'Beside others',
  documents: 'Documents',
};

/** Steps of an integral curve on the screen. */
const CURVE_POINTS = 200;
const NO_PEAKS: readonly { ppm: number; height: number }[] = [];

/** A finished run to look at closely. What is chosen stands in the address. */
export function Viewer({ labId, run, result }: { labId: string; run: Run; result: RunResult }) {
  const [search, setSearch] = useSearchParams();
  const view = useMemo(() => readView(search), [search]);
  const set = (change: Partial<ViewState>) =>
    setSearch(writeView({ ...view, ...change }), { replace: true, preventScrollReset: true });
  const { experiment, fid } = result;
  const hzPerPpm = larmorMHz(experiment.observe, experiment.protonMHz);
  const spectrum = useMemo(() => processed(result, view), [result, view]);
  const peaks = useMemo(
    () => (view.panel === 'peaks' ? pickPeaks(spectrum, view.threshold) : NO_PEAKS),
    [spectrum, view.panel, view.threshold],
  );
  const others = useQueries({ queries: view.beside.map((id) => resultQuery(labId, id)) });
  const loaded = others.flatMap(({ data }) => (data ? [data] : []));
  const main: ShownTrace = { label: run.system.name, spectrum };
  const beside = loaded.map((other) => ({ label: other.system.name, spectrum: other.spectrum }));
  const shown = stackTraces([main, ...beside], view.layout);
  const traces: PlotTrace[] =
    view.show === 'fid'
      ? [{ label: 'FID', samples: { first: 0, last: (fid.real.length - 1) * fid.dwell, values: fid.real } }]
      : shown.map(({ label, spectrum: s }) => ({
          label,
          samples: { first: s.firstPpm, last: s.lastPpm, values: s.real },
        }));
  const integrals = useMemo(() => drawnIntegrals(spectrum, view, hzPerPpm), [spectrum, view, hzPerPpm]);
  const [marking, setMarking] = useState(false);
  const full = fullRange(spectrum);
  const range = view.range ?? full;
  const picture = usePicture(run.system.name, range, traces, integrals, peaks, view.scale);
  useCommands([
    { id: 'view.whole', label: 'Show the whole spectrum', run: () => set({ range: null, scale: 1 }) },
    {
      id: 'view.mark',
      label: 'Mark a region to integrate',
      run: () => (set({ panel: 'integrals' }), setMarking(true)),
    },
    { id: 'view.svg', label: 'Save the picture as SVG', run: () => saveSvg(picture, run.system.name) },
    { id: 'view.png', label: 'Save the picture as PNG', run: () => void savePng(picture, run.system.name) },
    ...PANELS.map((panel) => ({
      id: `view.${panel}`,
      label: `Show ${PANEL_NAMES[panel].toLowerCase()}`,
      run: () => set({ panel }),
    })),
  ]);
  const addRegion = (region: Range) => {
    setMarking(false);
    set({ panel: 'integrals', integrals: [...view.integrals, region] });
  };
  const onFid = view.show === 'fid';
  return (
    <div className={classes.viewer}>
      <div className={classes.plot}>
        <Group justify="space-between" mb={6} gap="xs">
          <SegmentedControl
            size="xs"
            aria-label="What is shown"
            data={[
              { value: 'spectrum', label: 'Spectrum' },
              { value: 'fid', label: 'FID' },
            ]}
            value={view.show}
            onChange={(show) => set({ show: show })}
          />
          <Group gap={6}>
            <Button
              size="xs"
              variant="default"
              onClick={() => set({ range: null, scale: 1 })}
              disabled={!view.range && view.scale === 1}
            >
              Whole
            </Button>
            <Button size="xs" variant="default" onClick={() => void copySvg(picture)}>
              Copy SVG
            </Button>
            <Button size="xs" variant="default" onClick={() => void savePng(picture, run.system.name)}>
              Save PNG
            </Button>
          </Group>
        </Group>
        {onFid ? (
          <SpectrumPlot
            label={`FID of ${run.system.name}`}
            traces={traces}
            full={{ high: (fid.real.length - 1) * fid.dwell, low: 0 }}
            range={null}
            onRange={() => undefined}
            height={420}
            least={8 * fid.dwell}
            unit="s"
            rising
          />
        ) : (
          <SpectrumPlot
            label={`${experiment.observe} spectrum of ${run.system.name} at ${experiment.protonMHz} MHz`}
            traces={traces}
            full={full}
            range={view.range}
            onRange={(next) => set({ range: next })}
            scale={view.scale}
            onScale={(scale) => set({ scale })}
            height={420}
            least={narrowest(spectrum)}
            hzPerPpm={hzPerPpm}
            lines={result.lines}
            peaks={peaks}
            integrals={integrals}
            onRegion={marking ? addRegion : undefined}
          />
        )}
        <Text size="xs" c="dimmed" mt={4}>
          {marking
            ? 'Drag over the region to integrate.'
            : 'Drag to zoom, wheel to come closer, Shift and wheel for height; with the keyboard arrows, plus, minus, Home.'}
        </Text>
      </div>
      <Tabs value={view.panel} onChange={(panel) => set({ panel: (panel ?? 'report') as Panel })} keepMounted={false}>
        <Tabs.List aria-label="About this run">
          {PANELS.map((panel) => (
            <Tabs.Tab key={panel} value={panel}>
              {PANEL_NAMES[panel]}
            </Tabs.Tab>
          ))}
        </Tabs.List>
        <div className={classes.panel}>
          <Tabs.Panel value="report">
            <LeftOut report={result.report} />
          </Tabs.Panel>
          <Tabs.Panel value="processing">
            <ProcessingPanel
              own={experiment.processing}
              view={view}
              points={fid.real.length}
              onChange={(processing) => set({ processing })}
            />
          </Tabs.Panel>
          <Tabs.Panel value="peaks">
            <PeaksPanel
              peaks={peaks}
              hzPerPpm={hzPerPpm}
              threshold={view.threshold}
              onThreshold={(threshold) => set({ threshold })}
            />
          </Tabs.Panel>
          <Tabs.Panel value="integrals">
            <IntegralsPanel
              spectrum={spectrum}
              view={view}
              hzPerPpm={hzPerPpm}
              marking={marking}
              onMark={setMarking}
              onChange={set}
            />
          </Tabs.Panel>
          <Tabs.Panel value="lines">
            <LinesPanel
              lines={result.lines}
              range={range}
              onShow={(ppm) => set({ range: around(ppm, full, hzPerPpm) })}
            />
          </Tabs.Panel>
          <Tabs.Panel value="compare">
            <ComparePanel labId={labId} run={run} view={view} onChange={set} />
          </Tabs.Panel>
          <Tabs.Panel value="documents">
            <DocumentsPanel result={result} />
          </Tabs.Panel>
        </div>
      </Tabs>
    </div>
  );
}

function processed(result: RunResult, view: ViewState): Spectrum {
  if (Object.keys(view.processing).length === 0) return result.spectrum;
  const processing = { ...result.experiment.processing, ...view.processing };
  const zeroFill = processing.zeroFill + (processing.zeroFill % 2);
  return fidToSpectrum(result.fid, { ...result.experiment, processing: { ...processing, zeroFill } });
}

function drawnIntegrals(spectrum: Spectrum, { integrals, reference }: ViewState, hzPerPpm: number) {
  const values = integrals.map((region) => integrate(spectrum, region, hzPerPpm));
  const unit = reference ? values[reference.index] / reference.nuclei : 1;
  return integrals.map((region, i) => ({
    range: region,
    curve: runningIntegral(spectrum, region, hzPerPpm, CURVE_POINTS),
    label: (values[i] / unit).toFixed(2),
  }));
}

/** A stretch of 30 Hz around a line. */
function around(ppm: number, full: Range, hzPerPpm: number): Range {
  const half = Math.min(15 / hzPerPpm, (full.high - full.low) / 2);
  return { high: ppm + half, low: ppm - half };
}

function usePicture(
  title: string,
  range: Range,
  traces: readonly PlotTrace[],
  integrals: ReturnType<typeof drawnIntegrals>,
  peaks: readonly { ppm: number; height: number }[],
  scale: number,
) {
  const dyes = useDyes();
  const { least, most } = heights(traces.map(({ samples }) => samples.values));
  return { title, range, traces, integrals, peaks, dyes, least: least / scale, most: most / scale };
}
