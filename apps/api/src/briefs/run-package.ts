import { createHash } from 'node:crypto';
import { toCsv, toJcamp, toResultDocument, type Result } from '@heddle/shared';
import { strToU8, zipSync } from 'fflate';

/** What a package says of its run besides the result. */
export interface PackageFacts {
  runId: string;
  revision: number;
  author: string;
  date: Date;
  /** The brief, to lie beside the data. */
  brief: Uint8Array;
}

const CONTEXT = 'https://w3id.org/ro/crate/1.1/context';
const PUBLISHER = 'https://heddle.example';

/**
 * A research-data package (.eln): a zip with one folder that is an RO-Crate 1.1, holding both documents, the result, the
 * spectrum as JCAMP-DX and CSV and the brief, each with size and SHA-256.
 */
export function makePackage(result: Result, facts: PackageFacts): { name: string; bytes: Uint8Array } {
  const name = `${result.system.name.replace(/[^A-Za-z0-9]+/g, '-').replace(/^-|-$/g, '') || 'run'}-${facts.runId.slice(0, 8)}`;
  const json = (value: object) => strToU8(JSON.stringify(value, null, 2));
  const files: Record<string, { bytes: Uint8Array; type: string; about: string }> = {
    'system.json': { bytes: json(result.system), type: 'application/json', about: 'Spin system' },
    'experiment.json': { bytes: json(result.experiment), type: 'application/json', about: 'Experiment' },
    'result.json': {
      bytes: strToU8(JSON.stringify(toResultDocument(result))),
      type: 'application/json',
      about: 'Result',
    },
    'spectrum.jdx': { bytes: strToU8(toJcamp(result)), type: 'chemical/x-jcamp-dx', about: 'Predicted spectrum' },
    'spectrum.csv': { bytes: strToU8(toCsv(result)), type: 'text/csv', about: 'Predicted spectrum' },
    'brief.pdf': { bytes: facts.brief, type: 'application/pdf', about: 'Brief for the spectrometer' },
  };
  const metadata = json(crate(result, facts, files));
  const contents = Object.fromEntries(Object.entries(files).map(([file, { bytes }]) => [`${name}/run/${file}`, bytes]));
  return { name, bytes: zipSync({ [`${name}/ro-crate-metadata.json`]: metadata, ...contents }, { level: 6 }) };
}

function crate(
  { system, experiment, report }: Result,
  { runId, revision, author, date }: PackageFacts,
  files: Record<string, { bytes: Uint8Array; type: string; about: string }>,
): object {
  const day = date.toISOString();
  const settings: Record<string, string | number> = {
    protonMHz: experiment.protonMHz,
    observe: experiment.observe,
    temperature: experiment.temperature,
    revision,
    engine: report.engine,
    method: report.method,
    source: 'predicted, not measured',
  };
  const variables = Object.entries(settings).map(([propertyID, value]) => ({
    '@id': `#${propertyID}`,
    '@type': 'PropertyValue',
    propertyID,
    value,
  }));
  return {
    '@context': CONTEXT,
    '@graph': [
      {
        '@id': 'ro-crate-metadata.json',
        '@type': 'CreativeWork',
        about: { '@id': './' },
        conformsTo: { '@id': 'https://w3id.org/ro/crate/1.1' },
        dateCreated: day,
        sdPublisher: { '@id': PUBLISHER },
      },
      { '@id': PUBLISHER, '@type': 'Organization', name: 'Heddle', url: PUBLISHER },
      { '@id': '#author', '@type': 'Person', name: author },
      {
        '@id': '#licence',
        '@type': 'CreativeWork',
        name: 'All rights reserved',
        description: 'Ask the author before reuse.',
      },
      {
        '@id': './',
        '@type': 'Dataset',
        name: system.name,
        description: `A predicted NMR spectrum of ${system.name}, with everything needed to repeat the prediction.`,
        datePublished: day,
        license: { '@id': '#licence' },
        hasPart: [{ '@id': './run/' }],
      },
      {
        '@id': './run/',
        '@type': 'Dataset',
        identifier: runId,
        name: `${system.name}, ${experiment.observe} at ${experiment.protonMHz} MHz`,
        author: { '@id': '#author' },
        dateCreated: day,
        variableMeasured: variables.map((node) => ({ '@id': node['@id'] })),
        hasPart: Object.keys(files).map((file) => ({ '@id': `./run/${file}` })),
      },
      ...variables,
      ...Object.entries(files).map(([file, { bytes, type, about }]) => ({
        '@id': `./run/${file}`,
        '@type': 'File',
        name: file,
        description: about,
        encodingFormat: type,
        contentSize: String(bytes.length),
        sha256: createHash('sha256').update(bytes).digest('hex'),
      })),
    ],
  };
}
