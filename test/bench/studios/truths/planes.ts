import { around, between, happens, ratioBetween } from '../chance.ts';
import { boundaryAlumina, drawLink, type Family, type Glaze } from './truth.ts';

/** One straight limit: the most of `amount` that melts. */
interface Limit {
  readonly amount: (glaze: Glaze) => number;
  /** At the usual glaze and cone 6. */
  readonly place: number;
  /** How far a cone moves it. */
  readonly perCone: number;
  /** In cones per mol: what silica, alumina, boric oxide and the fluxes do for it. */
  readonly by: Partial<Glaze>;
}

/**
 * Straight limits: two or three half planes, of which the nearest decides; a matte line through the
 * origin, so that the ratio of silica to alumina decides.
 */
export const planes: Family = (chance) => {
  const draw = (low: number, high: number) => between(chance, low, high);
  const fluxes = () => ({
    boric: draw(5, 11),
    alkali: draw(1, 6),
    magnesia: draw(-3, 4),
    zinc: draw(0, 8),
  });
  const limits: Limit[] = [
    {
      amount: (glaze) => glaze.alumina,
      place: boundaryAlumina(chance),
      perCone: draw(0.07, 0.13),
      by: { ...fluxes(), silica: draw(-0.2, 0.4) },
    },
    {
      amount: (glaze) => glaze.silica,
      place: around(chance, 4.7, 0.4),
      perCone: draw(0.5, 0.9),
      by: { ...fluxes(), alumina: draw(0, 4) },
    },
  ];
  if (happens(chance, 0.5)) limits.push(sumLimit(draw(3, 5), around(chance, 6.4, 0.4), fluxes()));
  const width = ratioBetween(chance, 0.3, 1);
  const ratio = ratioLimit(draw, around(chance, 5.1, 0.5));
  const ratioWidth = ratioBetween(chance, 0.35, 1.1);
  const meltLink = drawLink(chance);
  const glossLink = drawLink(chance);
  return {
    family: 'planes',
    melted: (glaze, cone) =>
      meltLink(Math.min(...limits.map((limit) => marginCones(limit, glaze, cone))) / width),
    glossy: (glaze, cone, cooling) =>
      glossLink((glaze.silica / glaze.alumina - ratio(glaze, cone)) / ratioWidth + cooling),
  };
};

/** Silica and alumina together: what stiffens where both are high. */
function sumLimit(aluminaShare: number, place: number, by: Partial<Glaze>): Limit {
  return {
    amount: (glaze) => glaze.silica + aluminaShare * glaze.alumina,
    place,
    perCone: 0.8,
    by,
  };
}

/** Cones by which a glaze lies inside a limit. */
function marginCones({ amount, place, perCone, by }: Limit, glaze: Glaze, cone: number): number {
  const { silica = 0, alumina = 0, boric = 0, alkali = 0, magnesia = 0, zinc = 0 } = by;
  const eased =
    silica * (glaze.silica - 3.5) +
    alumina * (glaze.alumina - 0.45) +
    boric * (glaze.boric - 0.175) +
    alkali * (glaze.alkali - 0.3) +
    magnesia * (glaze.magnesia - 0.05) +
    zinc * (glaze.zinc - 0.02);
  return (place - amount(glaze)) / perCone + eased + (cone - 6);
}

function ratioLimit(
  draw: (low: number, high: number) => number,
  ratio: number,
): (glaze: Glaze, cone: number) => number {
  const boron = draw(0, 4);
  const magnesia = draw(0, 8);
  const alkali = draw(-1, 3);
  const perCone = draw(0.1, 0.5);
  return (glaze, cone) =>
    ratio -
    boron * (glaze.boric - 0.175) +
    magnesia * (glaze.magnesia - 0.05) -
    alkali * (glaze.alkali - 0.3) -
    perCone * (cone - 6);
}
