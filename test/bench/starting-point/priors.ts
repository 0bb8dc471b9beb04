// Frozen: the starting point of the model, kept unchanged as the yardstick that later models are
// measured against. Do not improve it; `src/model` is where the model is improved.
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
  /** Starting sd of the loads' intercepts, log-odds. */
  readonly startLoadSd: number;
}

/**
 * Prior of melting: more silica, more alumina and less heat make underfired likelier, boron and
 * alkali melt, and both ends of a silica or alumina line end underfired (common practice; Seger
 * 1886 prints that fusibility first rises and then falls with alumina).
 *
 * The sds were weighed on invented studios; the table stands in DEVELOPERS.md.
 */
export const MELT_PRIOR: StagePrior = {
  startLoadSd: 0.5,
  groups: [
    { name: 'intercept', startSd: 2, means: { '1': 1.5 } },
    { name: 'silica and alumina', startSd: 1.2, means: { SiO2: -2, Al2O3: -2 } },
    { name: 'fluxes', startSd: 0.9, means: { B2O3: 1, KNaO: 0.5, MgO: 0, ZnO: 0 } },
    { name: 'heat', startSd: 0.6, means: { heat: 1.5 } },
    {
      name: 'curvature',
      startSd: 0.6,
      means: { 'SiO2^2': -0.5, 'Al2O3^2': -0.5, 'SiO2*Al2O3': 0, ratio: 0, 'ratio^2': 0 },
    },
    {
      name: 'interactions',
      startSd: 0.3,
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
  startLoadSd: 0.5,
  groups: [
    { name: 'intercept', startSd: 2, means: { '1': 1 } },
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
 */
export function priorColumns(prior: StagePrior): string[] {
  return prior.groups.flatMap((group) => groupColumns(group));
}

/**
 * The columns of a group.
 *
 * @param group - group of a prior
 * @returns column names
 */
export function groupColumns(group: GroupPrior): string[] {
  return Object.keys(group.means);
}
