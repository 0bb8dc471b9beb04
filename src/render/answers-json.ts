import { hazardNotes } from '../chemistry/hazards.ts';
import { alkaliShare } from '../chemistry/unity.ts';
import type { ArchiveReading } from '../archive/archive.ts';
import type { Inventory } from '../archive/inventory.ts';
import type { Stage } from '../model/model.ts';
import { silicaToAlumina } from './composition-words.ts';
import type { FitOutcome } from './fit-page.ts';
import { fewTilesNote } from './held-out-sections.ts';
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
export function fitAnswer({ model, leftOut, writtenTo, doubts = [] }: FitOutcome) {
  return {
    schema: 'coneshift.fit/1',
    archive: model.archive.fingerprint,
    counts: model.archive.counts,
    melt: stageAnswer(model.melt),
    gloss: stageAnswer(model.gloss),
    loadSpread: model.loadSpread,
    loads: model.loads,
    firingEffects: model.firingEffects ?? [],
    logEvidence: model.logEvidence,
    validation: model.validation,
    faults: leftOut,
    diagnostics: model.diagnostics,
    notes: [...doubts, ...fewTilesNote(model.validation), ...model.notes],
    writtenTo: writtenTo ?? null,
  };
}

/**
 * What `fit --json` writes where faulty rows stop the fit.
 *
 * @param reading - archive and faults
 * @returns plain data: counts and faults, without a model
 * @example
 * const csv = 'tile,SiO2,Al2O3,CaO,cone,surface\nA,3,0.4,1,six,gloss\n';
 * const reading = readArchive(new Map([['a.csv', new TextEncoder().encode(csv)]]));
 * unfittedAnswer(reading).counts.refused; // 1
 */
export function unfittedAnswer({ archive, faults }: ArchiveReading) {
  return {
    schema: 'coneshift.fit/1',
    archive: archive.fingerprint,
    counts: archive.counts,
    faults,
    notes: archive.notes,
    writtenTo: null,
  };
}

function stageAnswer({ tiles, groups, residual, wrongVerdicts }: Stage) {
  return { tiles, groups, residual, wrongVerdicts };
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
