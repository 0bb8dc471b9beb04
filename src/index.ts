/** The public library: learn from judged tiles where the surfaces lie, and ask it. */
export {
  ArchiveError,
  CompositionError,
  ConeError,
  faultLine,
  ModelFileError,
  StudioError,
  type Fault,
} from './errors.ts';

export { coneIndex, coneText } from './firing/cone.ts';
export { endPointC } from './firing/end-points.ts';

export { FLUXES, isOxide, MOLAR_MASS, OXIDES, type Oxide } from './chemistry/oxides.ts';
export {
  alkaliShare,
  molesOf,
  toUnity,
  unityFormula,
  type Moles,
  type Unity,
  type WeightPercent,
} from './chemistry/unity.ts';
export { formulaMassGPerMol, lossOnIgnitionPercent, mineralMoles } from './chemistry/formula.ts';
export { molesPer100gRaw } from './chemistry/material.ts';
export { recipeUnity } from './chemistry/recipe.ts';
export { GENERAL_CAUTIONS, hazardNotes } from './chemistry/hazards.ts';

export type * from './archive/archive.ts';
export { parseArchive, readArchive, type ParseOptions } from './archive/read-archive.ts';
export { readPoints } from './archive/read-points.ts';

export * from './model/model.ts';
export { fitModel, type FitOptions } from './model/fit.ts';
export { modelText, parseModel } from './model/model-file.ts';

export type * from './predict/answers.ts';
export { predict } from './predict/predict.ts';
export { shift } from './predict/shift.ts';
export { boundaries, type BoundariesOptions } from './predict/boundaries.ts';
export { glazePoint, recipePoint } from './predict/point.ts';
