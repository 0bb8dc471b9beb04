/** The public library: learn from judged tiles where the surfaces lie, and ask it. */
export {
  ArchiveError,
  CompositionError,
  ConeError,
  faultLine,
  ModelFileError,
  StudioError,
  UnsolvableError,
  UsageError,
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
export { ARCHIVE_FILES } from './archive/archive-files.ts';
export { inventory, type Inventory } from './archive/inventory.ts';
export { parseArchive, readArchive, type ParseOptions } from './archive/read-archive.ts';
export { readGlaze, type GlazeRead } from './archive/glaze-text.ts';
export { compositionDoubts } from './archive/odd-compositions.ts';
export { readPoints, type PointsRead } from './archive/read-points.ts';

export * from './model/model.ts';
export { fitModel, type FitOptions } from './model/fit.ts';
export { modelText, parseModel } from './model/model-file.ts';

export type * from './predict/answers.ts';
export { predict, predictEach, type PredictionsOneByOne } from './predict/predict.ts';
export { shift } from './predict/shift.ts';
export { boundaries, type BoundariesOptions } from './predict/boundaries.ts';
export { glazePoint, recipePoint } from './predict/point.ts';

export { jsonPieces, toJson } from './render/json.ts';
export { PLAIN_LOOK, type Look } from './render/page.ts';
export { printable, textWidth } from './render/printable.ts';
export { wrapped, type Margins } from './render/wrapped.ts';
export { compositionWords, silicaToAlumina } from './render/composition-words.ts';
export { checkPage } from './render/check-page.ts';
export { fitPage, type FitOutcome } from './render/fit-page.ts';
export { predictionPage } from './render/prediction-page.ts';
export { shiftPage } from './render/shift-page.ts';
export { boundaryPage } from './render/boundary-page.ts';
export { unityPage, type RecipeUnity } from './render/unity-page.ts';
export { checkAnswer, fitAnswer, unfittedAnswer, unityAnswer } from './render/answers-json.ts';
