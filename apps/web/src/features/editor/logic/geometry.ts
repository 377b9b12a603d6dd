import type { GeometrySystem } from '@heddle/shared';
import { fromDocument, isBlankRow, type Draft } from './draft';

/**
 * The draft with the nuclei of a structure added, and their dipolar couplings. A nucleus of the same name takes the new
 * place and keeps the rest; a pair that is there already becomes dipolar by positions.
 */
export function withGeometry(draft: Draft, { nuclei, couplings }: GeometrySystem): Draft {
  const found = fromDocument({
    format: 'heddle.spin-system/1',
    name: '',
    nuclei: [...nuclei],
    couplings: [...couplings],
  });
  const idOf = (cells: Readonly<Record<string, string>>) => (cells.id ?? '').trim();
  const pairOf = (cells: Readonly<Record<string, string>>) =>
    [cells['between.0'] ?? '', cells['between.1'] ?? ''].sort().join(',');
  const places = new Map(found.nuclei.map((row) => [idOf(row.cells), row]));
  const pairs = new Map(found.couplings.map((row) => [pairOf(row.cells), row]));
  const known = draft.nuclei.filter((row) => !isBlankRow(row));
  const joined = draft.couplings.filter((row) => !isBlankRow(row));
  const oldIds = new Set(known.map((row) => idOf(row.cells)));
  const oldPairs = new Set(joined.map((row) => pairOf(row.cells)));
  return {
    ...draft,
    nuclei: [
      ...known.map((row) => {
        const place = places.get(idOf(row.cells));
        return place ? { ...row, cells: { ...place.cells, ...row.cells, ...positionOf(place.cells) } } : row;
      }),
      ...found.nuclei.filter((row) => !oldIds.has(idOf(row.cells))),
    ],
    couplings: [
      ...joined.map((row) =>
        pairs.has(pairOf(row.cells)) ? { ...row, cells: { ...row.cells, dipolar: 'positions' } } : row,
      ),
      ...found.couplings.filter((row) => !oldPairs.has(pairOf(row.cells))),
    ],
  };
}

function positionOf(cells: Readonly<Record<string, string>>): Record<string, string> {
  return Object.fromEntries(Object.entries(cells).filter(([field]) => field.startsWith('position.')));
}
