/** One line of the table; without a peer the last four are absent. Seconds; ratio = peer / engine, above 1 is faster. */
export interface Row {
  case: string;
  method: string;
  dimensions: Record<string, number>;
  first: number;
  best: number;
  peer?: string;
  peerSeconds?: number;
  ratio?: number;
  accuracy?: number;
}

const seconds = (value: number) => `${value.toFixed(4)} s`.padStart(12);

export function printHeader(withPeers: boolean): void {
  const peers = withPeers
    ? `  ${'peer'.padEnd(24)}${'peer'.padStart(12)}${'peer / engine'.padStart(15)}${'accuracy'.padStart(11)}`
    : '';
  process.stdout.write(
    `${'case'.padEnd(24)}${'method'.padEnd(22)}${'first'.padStart(12)}${'best'.padStart(12)}${peers}\n`,
  );
}

export function printRow(row: Row): void {
  let line = `${row.case.padEnd(24)}${row.method.slice(0, 20).padEnd(22)}${seconds(row.first)}${seconds(row.best)}`;
  if (row.peer !== undefined) {
    line += `  ${row.peer.padEnd(24)}${seconds(row.peerSeconds!)}${row.ratio!.toFixed(2).padStart(15)}`;
    line += row.accuracy!.toExponential(1).padStart(11);
  } else {
    const counts = Object.entries(row.dimensions).map(([name, count]) => `${name} ${count}`);
    line += `  ${counts.join(', ')}`;
  }
  process.stdout.write(`${line}\n`);
}
