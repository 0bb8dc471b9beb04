import { endPointC } from './end-points.ts';
import { around, between, ratioBetween } from '../chance.ts';
import {
  boundaryAlumina,
  boundaryGlaze,
  drawLink,
  saturating,
  type Family,
  type Glaze,
} from './truth.ts';

/** Degrees C that a cone is worth about cone 6, between the 36 below and the 17 above. */
const CONE_STEP_C = 26;

/**
 * Even in temperature, not in cone numbers, and boron acts more the hotter it is. The heat needed is
 * a product of powers of silica and alumina with a valley in ln alumina; gloss goes by glass formers
 * over stiffeners.
 */
export const thermal: Family = (chance) => {
  const draw = (low: number, high: number) => between(chance, low, high);
  const steps = (cone: number) => (endPointC(cone) - endPointC(6)) / CONE_STEP_C;
  const required = requiredSteps(draw);
  const needed = required(boundaryGlaze(boundaryAlumina(chance)));
  const boron = { effect: draw(2, 4), scale: draw(0.1, 0.3), withHeat: draw(0.15, 0.4) };
  const fluxed = ({ boric }: Glaze, heat: number) =>
    boron.effect *
    (saturating(boric, boron.scale) - saturating(0.175, boron.scale)) *
    Math.max(0.2, 1 + boron.withHeat * heat);
  const width = ratioBetween(chance, 0.3, 1);
  const former = formerRatio(draw);
  const ratio = around(chance, 5.1, 0.45) + former({ ...boundaryGlaze(0.5), silica: 0 }, 0);
  const glossPerStep = draw(0.1, 0.5);
  const glossWidth = ratioBetween(chance, 0.35, 1);
  const meltLink = drawLink(chance);
  const glossLink = drawLink(chance);
  return {
    family: 'thermal',
    melted: (glaze, cone) => {
      const heat = steps(cone);
      return meltLink((heat - required(glaze) + needed + fluxed(glaze, heat)) / width);
    },
    glossy: (glaze, cone, cooling) => {
      const heat = steps(cone);
      const score = (former(glaze, heat) - ratio + glossPerStep * heat) / glossWidth;
      return glossLink(score + cooling);
    },
  };
};

type Draw = (low: number, high: number) => number;

function requiredSteps(draw: Draw): (glaze: Glaze) => number {
  const stiffness = draw(5, 9);
  const silicaPower = draw(0.7, 1.2);
  const aluminaPower = draw(0.4, 0.8);
  const valley = { depth: draw(0.2, 0.9), place: draw(0.35, 0.5) };
  const alkaliEffect = draw(1, 6);
  const magnesiaEffect = draw(-6, 4);
  const zincEffect = draw(0, 8);
  return ({ silica, alumina, alkali, magnesia, zinc }) =>
    stiffness * (silica / 3.5) ** silicaPower * (alumina / 0.7) ** aluminaPower +
    valley.depth * Math.log(alumina / valley.place) ** 2 +
    Math.exp((alumina - 0.85) / 0.09) -
    alkaliEffect * Math.log(alkali / 0.3 + 0.2) -
    magnesiaEffect * magnesia -
    zincEffect * zinc;
}

/** Glass formers over stiffeners: silica, and boron the more the hotter, over alumina and magnesia. */
function formerRatio(draw: Draw): (glaze: Glaze, heat: number) => number {
  const boronWeight = draw(0.5, 2.5);
  const magnesiaWeight = draw(0, 0.8);
  const limeWeight = draw(0, 0.1);
  const withHeat = draw(0, 0.3);
  return ({ silica, alumina, boric, alkali, magnesia }, heat) =>
    (silica + boronWeight * boric * (1 + withHeat * heat)) /
    (alumina + magnesiaWeight * magnesia + limeWeight * (0.7 - alkali));
}
