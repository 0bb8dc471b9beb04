import { averagedProbability } from '../numeric/logistic-normal.ts';
import { stageLogOdds, type StageWeights } from './log-odds.ts';
import type { JudgedTile } from './stages.ts';

/** Glazes whose chance to melt falls as the fire grows hotter: more heat never melts less. */
export interface HeatCheck {
  /** Glazes looked at, and those that fall. */
  readonly glazes: number;
  readonly falling: number;
  /** Largest fall of P(melted) on the way from cool to hot. */
  readonly worst: number;
}

/** Every k-th tile of more stands for the rest. */
const MOST_GLAZES = 300;
/** Looked at from one cone below the coolest fired to one above the hottest, in such steps. */
const CONES_BEYOND = 1;
const CONE_STEP = 0.5;
/** Less is not seen on any page. */
const LEAST_FALL = 0.001;

/**
 * Whether the fitted chance to melt falls with heat at any fitted glaze.
 *
 * @param melt - fitted stage
 * @param tiles - judged tiles
 * @returns how many glazes fall, and by how much
 */
export function heatCheck(melt: StageWeights, tiles: readonly JudgedTile[]): HeatCheck {
  const every = Math.max(1, Math.ceil(tiles.length / MOST_GLAZES));
  const looked = [...tiles]
    .sort((a, b) => (a.tile < b.tile ? -1 : 1))
    .filter((_, i) => i % every === 0);
  const cones = tiles.map(({ heat }) => heat.coneIndex);
  const coolest = cones.reduce((a, b) => Math.min(a, b), Infinity) - CONES_BEYOND;
  const hottest = cones.reduce((a, b) => Math.max(a, b), -Infinity) + CONES_BEYOND;
  const falls = looked.map(({ unity }) => {
    let [best, fall] = [0, 0];
    for (let cone = coolest; cone <= hottest; cone += CONE_STEP) {
      const { mean, sd } = stageLogOdds(melt, unity, cone);
      const melted = averagedProbability(mean, sd);
      fall = Math.max(fall, best - melted);
      best = Math.max(best, melted);
    }
    return fall;
  });
  return {
    glazes: looked.length,
    falling: falls.filter((fall) => fall > LEAST_FALL).length,
    worst: falls.reduce((a, b) => Math.max(a, b), 0),
  };
}
