import type { Boundary, ConeAnswer, PointShift, Turn } from '../../src/predict/answers.ts';
import { coneIndex, coneText } from '../../src/firing/cone.ts';

/** Invented answers; what a test does not name is of no interest to it. */
export function aConeAnswer(cone: string, given: Partial<ConeAnswer> = {}): ConeAnswer {
  return {
    cone,
    coneIndex: coneIndex(cone),
    surface: 'gloss',
    probability: { underfired: 0.05, matte: 0.15, gloss: 0.8 },
    interval90: { underfired: [0.01, 0.12], matte: [0.06, 0.28], gloss: [0.64, 0.9] },
    support: 'inside',
    nearest: [{ tile: 'A1', surface: 'gloss', cone, distance: 0.42 }],
    notes: [],
    ...given,
  };
}

export function aTurn(index: number, given: Partial<Turn> = {}): Turn {
  return {
    from: 'underfired',
    to: 'gloss',
    coneIndex: index,
    cone: coneText(index),
    interval90: [index - 0.4, index + 0.4],
    noCrossing: 0,
    ...given,
  };
}

export function aPointShift(given: Partial<PointShift> = {}): PointShift {
  return {
    point: 'Clear',
    unity: { SiO2: 3.4, Al2O3: 0.42, B2O3: 0.15, K2O: 0.25, CaO: 0.75 },
    cones: ['5', '6', '7'].map((cone) => aConeAnswer(cone)),
    turns: [],
    lookedAt: [4, 8],
    words: 'at 5, 6 and 7 most likely gloss',
    overfiredNear: [],
    ...given,
  };
}

export function aBoundary(given: Partial<Boundary> = {}): Boundary {
  return {
    cone: '6',
    coneIndex: 6,
    kind: 'melt',
    along: 'Al2O3',
    at: { SiO2: 3.2 },
    value: 0.71,
    interval90: [0.66, 0.78],
    noCrossing: 0,
    lookedAt: [0.1, 0.9],
    tilesNear: 12,
    support: 'inside',
    nearest: [{ tile: 'A1', surface: 'matte', cone: '6', distance: 0.9 }],
    perCone: 0.12,
    perConeInterval90: [0.07, 0.19],
    below: 'melted',
    above: 'underfired',
    ...given,
  };
}
