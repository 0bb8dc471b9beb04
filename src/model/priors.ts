/** A group of columns that share one prior sd. */
export interface GroupPrior {
  readonly name: string;
  /** Prior sd before any tile, log-odds per unit of the column. */
  readonly startSd: number;
  /** Prior mean of each column. */
  readonly means: Readonly<Record<string, number>>;
}

/** The prior of one stage. */
export interface StagePrior {
  readonly groups: readonly GroupPrior[];
  /** Sd before any tile of the smooth departure from all columns, log-odds. */
  readonly startResidualSd: number;
}

/** What the loads of an archive differ in, before any tile. */
export const LOAD_PRIOR = {
  /** Sd of a load's heat about the cone on paper, in cones: of the middle of a Student's t. */
  startOffsetCones: 0.2,
  degreesOfFreedom: 5,
  /** Sd of what cooling and atmosphere do to the gloss of a load, log-odds. */
  startGlossSd: 0.3,
} as const;

/** Share of verdicts that are wrong, before any tile, and how many tiles that is worth. */
export const WRONG_VERDICTS = { startShare: 0.015, pseudoTiles: 100 } as const;

/**
 * Prior of melting: more silica, more alumina and less heat make underfired likelier, boron and
 * alkali melt, and both ends of a silica or alumina line end underfired (common practice). At a fixed
 * silica, fusibility rises with alumina to about 0.5 and then falls, and the more silica, the more
 * alumina it bears (H. Seger 1886, in Dingler's Polytechnisches Journal 261, pp. 38-42): alumina acts by
 * its square as well as by its slope, and by its product with silica. Magnesia as the only flux did
 * not melt where the others did (C. Lauth and G. Dutailly 1888, ibid. 272).
 *
 * The sds were weighed on invented studios; the table stands in DEVELOPERS.md.
 */
export const MELT_PRIOR: StagePrior = {
  startResidualSd: 0.8,
  groups: [
    { name: 'intercept', startSd: 2, means: { '1': 3 } },
    { name: 'silica and alumina', startSd: 1, means: { SiO2: -2, Al2O3: -0.5 } },
    { name: 'fluxes', startSd: 0.7, means: { B2O3: 1.5, KNaO: 0.7, MgO: -0.3, ZnO: 0 } },
    { name: 'heat', startSd: 0.6, means: { heat: 1.7 } },
    {
      name: 'curvature',
      startSd: 0.4,
      means: { 'SiO2^2': -0.5, 'Al2O3^2': -0.8, 'SiO2*Al2O3': 0.5, ratio: 0, 'ratio^2': 0 },
    },
    {
      name: 'interactions',
      startSd: 0.25,
      means: {
        'SiO2*B2O3': 0,
        'Al2O3*B2O3': 0,
        'SiO2*heat': 0,
        'Al2O3*heat': 0,
        'B2O3*heat': 0,
        'SiO2*KNaO': 0,
        'Al2O3*KNaO': 0,
        'B2O3^2': 0,
        'heat^2': 0,
        'KNaO*heat': 0,
      },
    },
  ],
};

/**
 * Prior of gloss among the melted: a high SiO2:Al2O3 ratio is gloss, near 5 and below matte (common
 * practice, no source); heat and boron help gloss a little, magnesia matte.
 */
export const GLOSS_PRIOR: StagePrior = {
  startResidualSd: 0.6,
  groups: [
    { name: 'intercept', startSd: 2, means: { '1': 2 } },
    { name: 'ratio', startSd: 1.5, means: { ratio: 4 } },
    {
      name: 'oxides',
      startSd: 0.6,
      means: { SiO2: 0, Al2O3: 0, B2O3: 0.5, KNaO: 0, MgO: -0.5, ZnO: 0 },
    },
    { name: 'heat', startSd: 0.42, means: { heat: 0.4 } },
    {
      name: 'interactions',
      startSd: 0.3,
      means: {
        'ratio^2': 0,
        'SiO2^2': 0,
        'Al2O3^2': 0,
        'SiO2*Al2O3': 0,
        'ratio*B2O3': 0,
        'ratio*heat': 0,
        'B2O3*heat': 0,
        'heat^2': 0,
        'B2O3^2': 0,
        'ratio*KNaO': 0,
        'ratio*MgO': 0,
      },
    },
  ],
};

/**
 * The columns of a stage, in the order of its groups.
 *
 * @param prior - prior of the stage
 * @returns column names
 * @example
 * priorColumns(MELT_PRIOR).slice(0, 3); // ['1', 'SiO2', 'Al2O3']
 */
export function priorColumns(prior: StagePrior): string[] {
  return prior.groups.flatMap((group) => groupColumns(group));
}

/**
 * The columns of a group.
 *
 * @param group - group of a prior
 * @returns column names
 * @example
 * groupColumns({ name: 'heat', startSd: 0.6, means: { heat: 1.5 } }); // ['heat']
 */
export function groupColumns(group: GroupPrior): string[] {
  return Object.keys(group.means);
}
