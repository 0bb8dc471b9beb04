import type { Unity } from '../chemistry/unity.ts';
import { quantile } from '../numeric/summary.ts';
import type { JudgedTile } from '../model/stages.ts';
import type { BoundaryAxis } from './answers.ts';

/** A straight line through a composition along which boundaries are looked for. */
export interface CompositionLine {
  readonly along: BoundaryAxis;
  /** What is held along the line. */
  readonly at: Readonly<Record<string, number>>;
  /** Range looked at, in units of the axis. */
  readonly range: readonly [number, number];
  /** The composition at a place on the line. */
  readonly unityAt: (place: number) => Unity;
}

/** Looked at where there are no tiles: mol per mol flux, and the ratio. */
const USUAL_RANGE: Readonly<Record<BoundaryAxis, readonly [number, number]>> = {
  Al2O3: [0.1, 1],
  SiO2: [1.5, 7],
  'SiO2:Al2O3': [2, 16],
};
/** The range covers all tiles but the outermost few, and goes beyond by a share of their spread. */
const OUTERMOST = 0.02;
const SHARE_BEYOND = 0.25;
/** Keeps the lower end of a range above nothing: the ratio needs alumina. */
const LEAST: Readonly<Record<BoundaryAxis, number>> = { Al2O3: 0.02, SiO2: 0.2, 'SiO2:Al2O3': 1 };

/**
 * The lines through a composition: along alumina, along silica, and along their ratio with their sum
 * held. Each covers the judged
 * tiles but the outermost 2 % on either side, and a quarter of their spread beyond.
 *
 * @param through - composition
 * @param tiles - judged tiles
 * @returns three lines
 */
export function compositionLines(through: Unity, tiles: readonly JudgedTile[]): CompositionLine[] {
  const silica = through.SiO2 ?? 0;
  const alumina = through.Al2O3 ?? 0;
  const sum = silica + alumina;
  const line = (
    along: BoundaryAxis,
    at: Readonly<Record<string, number>>,
    unityAt: (place: number) => Unity,
  ) => ({ along, at, range: lookedAt(along, tiles), unityAt });
  return [
    line('Al2O3', { SiO2: silica }, (Al2O3) => ({ ...through, Al2O3 })),
    line('SiO2', { Al2O3: alumina }, (SiO2) => ({ ...through, SiO2 })),
    line('SiO2:Al2O3', { 'SiO2+Al2O3': sum }, (ratio) => ({
      ...through,
      SiO2: (sum * ratio) / (1 + ratio),
      Al2O3: sum / (1 + ratio),
    })),
  ];
}

/**
 * Place of a composition along an axis.
 *
 * @param unity - unity formula
 * @param along - axis
 * @returns mol per mol flux, or the ratio
 * @example
 * placeAlong({ SiO2: 3.5, Al2O3: 0.5, CaO: 1 }, 'SiO2:Al2O3'); // 7
 */
export function placeAlong(unity: Unity, along: BoundaryAxis): number {
  const silica = unity.SiO2 ?? 0;
  const alumina = unity.Al2O3 ?? 0;
  if (along === 'SiO2') return silica;
  return along === 'Al2O3' ? alumina : silica / alumina;
}

function lookedAt(along: BoundaryAxis, tiles: readonly JudgedTile[]): readonly [number, number] {
  const places = tiles.map(({ unity }) => placeAlong(unity, along)).filter(Number.isFinite);
  if (places.length === 0) return USUAL_RANGE[along];
  const [low, high] = [quantile(places, OUTERMOST), quantile(places, 1 - OUTERMOST)];
  if (!(high > low)) return USUAL_RANGE[along];
  const beyond = SHARE_BEYOND * (high - low);
  return [Math.max(LEAST[along], low - beyond), high + beyond];
}
