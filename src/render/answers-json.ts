import { hazardNotes } from '../chemistry/hazards.ts';
import { alkaliShare } from '../chemistry/unity.ts';
import type { ArchiveReading } from '../archive/archive.ts';
import type { Inventory } from '../archive/inventory.ts';
import type { Stage } from '../model/model.ts';
import { silicaToAlumina } from './composition-words.ts';
import type { FitOutcome } from './fit-page.ts';
import type { RecipeUnity } from './unity-page.ts';

/**
 * What `check --json` writes.
 *
 * @param reading - archive and faults
 * @param held - its inventory
 * @returns plain data
 */
export function checkAnswer({ archive, faults }: ArchiveReading, held: Inventory) {
  return {
    schema: 'coneshift.check/1',
    archive: archive.fingerprint,
    counts: archive.counts,
    files: archive.files,
    faults,
    notes: archive.notes,
    ...held,
  };
}

/**
 * What `fit --json` writes: the account of the fit. The model itself is a file of its own.
 *
 * @param outcome - model and what was done with it
 * @returns plain data
 */
export function fitAnswer({ model, leftOut, writtenTo }: FitOutcome) {
  return {
    schema: 'coneshift.fit/1',
    archive: model.archive.fingerprint,
    counts: model.archive.counts,
    melt: stageAnswer(model.melt),
    gloss: stageAnswer(model.gloss),
    validation: model.validation,
    faults: leftOut,
    notes: model.notes,
    writtenTo: writtenTo ?? null,
  };
}

function stageAnswer({ tiles, groups, loadSd, loads, logEvidence }: Stage) {
  return { tiles, groups, loadSd, loads, logEvidence };
}

/**
 * What `unity --json` writes.
 *
 * @param recipes - recipes with their unity formulas
 * @returns plain data; the ratio is null without alumina
 * @example
 * unityAnswer([{ recipe: 'Wash', unity: { SiO2: 2, CaO: 1 } }]).recipes[0].silicaToAlumina; // null
 */
export function unityAnswer(recipes: readonly RecipeUnity[]) {
  return {
    schema: 'coneshift.unity/1',
    recipes: recipes.map(({ recipe, unity }) => ({
      recipe,
      unity,
      silicaToAlumina: silicaToAlumina(unity),
      alkaliShare: alkaliShare(unity),
      hazards: hazardNotes(unity),
    })),
  };
}
