import { alkaliShare, type Unity } from '../../src/chemistry/unity.ts';

/**
 * The truth behind the demo studio: how often a tile of a composition comes out underfired, matte
 * or gloss at a heat. All numbers of this file are invented. The shape follows common practice and
 * Seger's findings (1886) and is on purpose no polynomial in oxides and cone numbers.
 */
export interface SurfaceTruth {
  readonly underfired: number;
  readonly matte: number;
  readonly gloss: number;
}

/**
 * End points of self-supporting cones 1 to 10 at 60 degC/h over the last 100 degC. The place of a
 * cone on the truth's scale of heat; published values, see `datasets/published/`.
 */
const END_POINT_C = [1137, 1142, 1152, 1162, 1186, 1222, 1239, 1249, 1260, 1285] as const;
const CONE_6_C = 1222;
const HEAT_STEP_C = 30;

/**
 * End-point temperature of a cone, straight between whole cones and beyond both ends.
 *
 * @param coneIndex - place on the scale of cone numbers, whole or not
 * @returns degrees Celsius
 */
export function endPointC(coneIndex: number): number {
  const below = Math.min(Math.max(Math.floor(coneIndex), 1), END_POINT_C.length - 1);
  const from = END_POINT_C[below - 1] ?? CONE_6_C;
  const to = END_POINT_C[below] ?? CONE_6_C;
  return from + (coneIndex - below) * (to - from);
}

/** Heat in steps of 30 degC, 0 at cone 6: even in temperature, not in cone numbers. */
function heatSteps(coneIndex: number): number {
  return (endPointC(coneIndex) - CONE_6_C) / HEAT_STEP_C;
}

const sigmoid = (x: number) => 1 / (1 + Math.exp(-x));
/** Rises steeply at first and then ever less, from 0 towards 1. */
const saturating = (amount: number, scale: number) => 1 - Math.exp(-amount / scale);
/** What alkali does beyond a share of 0.3 of the flux: strong where it is scarce. */
const alkaliEffect = (share: number) => share / (share + 0.2) - 0.6;

interface Composition {
  readonly silica: number;
  readonly alumina: number;
  readonly boric: number;
  readonly alkali: number;
  readonly magnesia: number;
  readonly zinc: number;
}

function compositionOf(unity: Unity): Composition {
  return {
    silica: unity.SiO2 ?? 0,
    alumina: unity.Al2O3 ?? 0,
    boric: unity.B2O3 ?? 0,
    alkali: alkaliShare(unity),
    magnesia: unity.MgO ?? 0,
    zinc: unity.ZnO ?? 0,
  };
}

/** The most alumina that melts where silica is no hindrance, mol per mol flux. */
function aluminaLimit(glaze: Composition, heat: number): number {
  const { silica, boric, alkali, magnesia, zinc } = glaze;
  return (
    0.56 +
    0.165 * heat +
    0.22 * saturating(boric, 0.13) +
    0.3 * alkaliEffect(alkali) +
    // A little magnesia fluxes, much of it stiffens.
    magnesia * (1 - magnesia / 0.18) * 0.6 +
    (0.5 * zinc) / (1 + zinc / 0.1) -
    0.25 * Math.exp((1.2 - silica) / 0.6)
  );
}

/** The most silica that melts: a valley of fusibility in alumina, deepest at 0.45 (Seger 1886). */
function silicaLimit(glaze: Composition, heat: number): number {
  const { alumina, boric, alkali, magnesia } = glaze;
  const toValley = alumina / 0.45;
  return (
    2.95 +
    0.85 * heat +
    1.5 * saturating(boric, 0.2) +
    2.5 * alkaliEffect(alkali) +
    1.3 * toValley * Math.exp(1 - toValley) -
    1.5 * magnesia * magnesia
  );
}

/** Log-odds of melting: the nearer of two limits rules, smoothly; boron makes the limit sharper. */
function meltLogOdds(glaze: Composition, heat: number): number {
  const sharpness = 0.75 + (0.8 * glaze.boric) / (glaze.boric + 0.15);
  const byAlumina = (aluminaLimit(glaze, heat) - glaze.alumina) / 0.055;
  const bySilica = (silicaLimit(glaze, heat) - glaze.silica) / 0.33;
  return -Math.log(Math.exp(-sharpness * byAlumina) + Math.exp(-sharpness * bySilica));
}

/** Silica at which a melted glaze is as likely matte as gloss: a line that misses the origin. */
function matteLine(glaze: Composition, heat: number): number {
  const { alumina, boric, alkali, magnesia, zinc } = glaze;
  return (
    1.2 +
    4.8 * alumina -
    1.35 * saturating(boric, 0.29) +
    (3.2 * magnesia * magnesia) / (magnesia + 0.1) +
    // Lime mattes: little alkali leaves much lime.
    0.9 * saturating(1 - alkali, 1) -
    0.45 +
    0.8 * zinc -
    0.28 * heat
  );
}

function glossLogOdds(glaze: Composition, heat: number): number {
  const width = 0.2 + 0.27 * glaze.alumina;
  return (glaze.silica - matteLine(glaze, heat)) / width;
}

/**
 * How often a tile truly comes out underfired, matte or gloss: no load error, no wrong verdict.
 *
 * @param unity - composition, mol per mol flux
 * @param coneIndex - heat truly reached, on the scale of cone numbers
 * @returns three probabilities that sum to 1
 */
export function trueProbability(unity: Unity, coneIndex: number): SurfaceTruth {
  const glaze = compositionOf(unity);
  const heat = heatSteps(coneIndex);
  const melted = sigmoid(meltLogOdds(glaze, heat));
  const glossy = sigmoid(glossLogOdds(glaze, heat));
  return { underfired: 1 - melted, matte: melted * (1 - glossy), gloss: melted * glossy };
}
