import { around, between, ratioBetween } from '../chance.ts';
import {
  boundaryAlumina,
  boundaryGlaze,
  drawLink,
  hump,
  saturating,
  type Family,
  type Glaze,
} from './truth.ts';

/**
 * Curved limits: the heat that a glaze needs rises ever faster with alumina and with silica; alumina
 * has a valley of fusibility, in which more silica melts; fluxes saturate. The matte line is a power
 * of alumina.
 */
export const curved: Family = (chance) => {
  const draw = (low: number, high: number) => between(chance, low, high);
  const required = requiredCones(draw, around(chance, 3.6, 0.35));
  const needed = required(boundaryGlaze(boundaryAlumina(chance)));
  const width = ratioBetween(chance, 0.3, 1);
  const line = matteLine(draw, around(chance, 5.1, 0.45));
  const glossWidth = ratioBetween(chance, 0.15, 0.45);
  const meltLink = drawLink(chance);
  const glossLink = drawLink(chance);
  return {
    family: 'curved',
    melted: (glaze, cone) => meltLink((cone - 6 - required(glaze) + needed) / width),
    glossy: (glaze, cone, cooling) =>
      glossLink((glaze.silica - line(glaze, cone)) / glossWidth + cooling),
  };
};

type Draw = (low: number, high: number) => number;

function requiredCones(draw: Draw, silicaPlace: number): (glaze: Glaze) => number {
  const silicaRate = draw(0.7, 1.1);
  const aluminaRate = draw(0.13, 0.19);
  const valley = { depth: draw(0.6, 1.4), place: draw(0.38, 0.5) };
  const boron = { effect: draw(1.5, 3.5), scale: draw(0.1, 0.25) };
  const alkaliEffect = draw(2, 6);
  const magnesiaEffect = draw(0, 5);
  const zincEffect = draw(2, 8);
  return ({ silica, alumina, boric, alkali, magnesia, zinc }) => {
    const place = silicaPlace + valley.depth * hump(alumina, valley.place);
    return (
      0.8 * Math.exp((silica - place) / silicaRate) +
      0.8 * Math.exp((alumina - 0.6) / aluminaRate) -
      boron.effect * saturating(boric, boron.scale) -
      alkaliEffect * (alkali / (alkali + 0.2)) -
      magnesiaEffect * magnesia * (1 - magnesia / 0.2) -
      (zincEffect * zinc) / (1 + zinc / 0.1)
    );
  };
}

/** Silica on the gloss boundary; `ratio` is SiO2:Al2O3 there at 0.45 alumina. */
function matteLine(draw: Draw, ratio: number): (glaze: Glaze, cone: number) => number {
  const power = draw(0.6, 1.5);
  const boronEffect = draw(0.2, 1.2);
  const magnesiaEffect = draw(1, 6);
  const limeEffect = draw(0, 1.2);
  const perCone = draw(0.1, 0.35);
  return ({ alumina, boric, alkali, magnesia }, cone) =>
    ratio * 0.45 * (alumina / 0.45) ** power -
    boronEffect * (saturating(boric, 0.2) - saturating(0.175, 0.2)) +
    (magnesiaEffect * magnesia * magnesia) / (magnesia + 0.1) -
    limeEffect * (alkali - 0.3) -
    perCone * (cone - 6);
}
