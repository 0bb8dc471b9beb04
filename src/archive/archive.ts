import type { Unity, WeightPercent, Moles } from '../chemistry/unity.ts';
import type { Fault } from '../errors.ts';

/** What the fit takes a tile for. `melted`: melted, but gloss or matte not judged. */
export type Verdict = 'underfired' | 'matte' | 'gloss' | 'melted' | 'overfired' | 'unjudged';

/** Where the heat of a tile was read, surest first. */
export type HeatSource = 'tile' | 'witness cone' | 'firing' | 'set cone';

/** The heat work that a tile had. */
export interface Heat {
  /** Cone as the trade writes it: '6', '06', '6.5'. */
  readonly cone: string;
  /** The same as a number: 1 -> 1, 01 -> 0, 06 -> -5. */
  readonly coneIndex: number;
  readonly source: HeatSource;
}

/** One tile as read: nothing of the row is lost. */
export interface Tile {
  readonly tile: string;
  /** Line in tiles.csv, the header being line 1. */
  readonly line: number;
  /** Composition that the tile was made to. */
  readonly unity: Unity;
  readonly recipe?: string;
  /** Name of the line or grid blend that the tile belongs to. */
  readonly blend?: string;
  readonly firing?: string;
  /** Absent only on a tile that is not judged yet. */
  readonly heat?: Heat;
  /** The tiles of one load share its error; a tile without a firing is a load of its own. */
  readonly load: string;
  /** The word in the `surface` column, as written ('' where blank). */
  readonly surfaceWritten: string;
  /** What the fit takes the tile for: the word, unless an unmelted drip overrules it. */
  readonly verdict: Verdict;
  readonly drip?: 'melted' | 'unmelted';
  readonly crazing?: 'none' | 'wide' | 'fine';
  readonly shivering?: boolean;
  readonly body?: string;
  readonly shelf?: string;
  readonly thicknessMm?: number;
  readonly glossUnits?: number;
  readonly judgedBy?: string;
  readonly note?: string;
  /** Cells of columns that coneshift does not know, kept as written. */
  readonly other?: Readonly<Record<string, string>>;
}

export interface Firing {
  readonly firing: string;
  readonly line: number;
  /** ISO date, as written. */
  readonly date?: string;
  readonly kiln?: string;
  readonly setCone?: string;
  readonly cone?: string;
  readonly peakC?: number;
  readonly holdMin?: number;
  readonly coolingCPerH?: number;
  readonly atmosphere?: 'oxidation' | 'reduction';
  readonly log?: string;
  readonly other?: Readonly<Record<string, string>>;
}

/** A witness cone read at one shelf of one firing. */
export interface WitnessReading {
  readonly firing: string;
  readonly line: number;
  readonly shelf: string;
  readonly cone: string;
  readonly coneIndex: number;
  readonly other?: Readonly<Record<string, string>>;
}

export interface RecipeLine {
  readonly material: string;
  readonly parts: number;
  /** Weighed on top of the hundred (colourants and the like). It counts in the formula all the same. */
  readonly over100: boolean;
  readonly line: number;
  readonly other?: Readonly<Record<string, string>>;
}

export interface Recipe {
  readonly recipe: string;
  readonly lines: readonly RecipeLine[];
  readonly unity: Unity;
}

export interface Material {
  readonly material: string;
  readonly line: number;
  /** As read, in wt% of the basis; absent where the material is given by its formula. */
  readonly analysis?: WeightPercent;
  readonly basis?: 'raw' | 'fired';
  /** Formula of a pure mineral. */
  readonly formula?: string;
  /** Loss on ignition, wt% of the raw material. */
  readonly loiPercent: number;
  /** Moles of each oxide in 100 g of the raw material. */
  readonly molesPer100g: Moles;
  readonly soluble: boolean;
  readonly other?: Readonly<Record<string, string>>;
}

export interface Body {
  readonly body: string;
  readonly line: number;
  readonly maturesAtCone?: string;
  readonly absorptionPercent?: number;
  readonly expansionPerK?: number;
  readonly other?: Readonly<Record<string, string>>;
}

/** Every row of tiles.csv is in exactly one of the last four: they sum to `read`. */
export interface TileCounts {
  readonly read: number;
  /** Judged underfired, matte, gloss or melted: what the fit uses. */
  readonly fitted: number;
  /** No verdict yet: kept, not fitted. */
  readonly unjudged: number;
  /** Overfired: kept, not fitted. */
  readonly setAside: number;
  /** Faulty rows. */
  readonly refused: number;
}

/** A studio's archive, read and checked. */
export interface Archive {
  /** `sha256:` and 64 hex digits over the names and bytes of the files read. */
  readonly fingerprint: string;
  readonly files: readonly { readonly file: string; readonly rows: number }[];
  /** Tiles of all rows that are sound, in the order of the file. */
  readonly tiles: readonly Tile[];
  readonly firings: readonly Firing[];
  readonly witness: readonly WitnessReading[];
  /** By name. */
  readonly recipes: readonly Recipe[];
  readonly materials: readonly Material[];
  readonly bodies: readonly Body[];
  readonly counts: TileCounts;
  /** What was understood and what looks odd, in sentences; never a fault. */
  readonly notes: readonly string[];
}

/** An archive as far as it could be read, and everything that is wrong with it. */
export interface ArchiveReading {
  /** Holds only what is sound; the faulty rows are counted as refused. */
  readonly archive: Archive;
  readonly faults: readonly Fault[];
}
