/** A whole command that is timed. */
export interface Job {
  readonly name: string;
  /** What Node is started with; `MAIN` stands for the built program, `NAME.csv` and `NAME.json` for files made. */
  readonly args: readonly string[];
  readonly bar?: Bar;
}

/** What a job is asked to reach. */
export interface Bar {
  /** In words, as in the table. */
  readonly text: string;
  /** Seconds, given those of `node -e 0` and of a tenth of the tiles. */
  readonly seconds: (bare: number, tenth: number) => number;
  readonly mebibytes?: number;
}

export const MAIN = 'MAIN';
/** Model that questions are put to. */
export const ASKED_TILES = 300;
export const SIZES = [40, 300, 3000, 10_000, 100_000] as const;

const FIT_BARS = new Map<number, Bar>([
  [300, { text: '3 x bare + 0.4 s', seconds: (bare) => 3 * bare + 0.4 }],
  [3000, { text: '4 s', seconds: () => 4 }],
  [
    100_000,
    {
      text: '30 s, 1 GiB, 12 x 10,000',
      seconds: (_, tenth) => Math.min(30, 12 * tenth),
      mebibytes: 1024,
    },
  ],
]);

/** Name of the fit of so many tiles. */
export const fitName = (size: number): string => `fit, ${size.toLocaleString('en')} tiles`;

/**
 * Fits of archives of the given sizes.
 *
 * @param sizes - judged tiles
 * @returns one job a size
 */
export function fitJobs(sizes: readonly number[]): Job[] {
  return sizes.map((size) => {
    const bar = FIT_BARS.get(size);
    return {
      name: fitName(size),
      args: [MAIN, 'fit', `tiles-${size}.csv`, '--out', `model-${size}.json`],
      ...(bar === undefined ? {} : { bar }),
    };
  });
}

/** The smallest start of Node, beside which others stand. */
export const BARE: Job = { name: 'node -e 0', args: ['-e', '0'] };

export const HELP_JOB: Job = {
  name: '--help',
  args: [MAIN, '--help'],
  bar: { text: '1.6 x bare', seconds: (bare) => 1.6 * bare },
};

const asked = (...rest: readonly string[]) => [
  MAIN,
  rest[0],
  `model-${ASKED_TILES}.json`,
  ...rest.slice(1),
];
const GLAZE = 'SiO2=3.4 Al2O3=0.42 B2O3=0.15 K2O=0.1 Na2O=0.15 CaO=0.75';
const THREE_CONES = ['--cone', '5', '6', '7'];

/** Questions put to the model of 300 tiles. */
export const QUESTION_JOBS: readonly Job[] = [
  {
    name: 'predict, 1,000 points x 3 cones',
    args: asked('predict', ...THREE_CONES, '--points', 'points-1000.csv', '--json'),
  },
  {
    name: 'predict, map of 200 x 200 x 3 cones',
    args: asked('predict', ...THREE_CONES, '--points', 'map-200.csv', '--json'),
  },
  {
    name: 'predict, 100,000 points x 1 cone',
    args: asked('predict', '--cone', '6', '--points', 'points-100000.csv', '--json'),
    bar: { text: '6 s', seconds: () => 6 },
  },
  { name: 'shift, 1 glaze', args: asked('shift', ...THREE_CONES, '--glaze', GLAZE) },
];
