import { around, between, ratioBetween } from '../chance.ts';
import { boundaryAlumina, boundaryGlaze, drawLink, type Family, type Glaze } from './truth.ts';

/**
 * A rounded corner (a superellipse in silica and alumina) that grows with heat, which saturates: each
 * cone adds less than the one before. The matte line is straight and misses the origin.
 */
export const rounded: Family = (chance) => {
  const draw = (low: number, high: number) => between(chance, low, high);
  const scale = draw(1.5, 3.5);
  /** Cones of effect, with slope 1 at cone 6. */
  const effect = (cone: number) => scale * (1 - Math.exp((6 - cone) / scale));
  const growth = draw(0.1, 0.18);
  const extent = extentOf(draw, around(chance, 5.1, 0.4), boundaryAlumina(chance));
  const width = ratioBetween(chance, 0.3, 1);
  const line = matteLine(draw, around(chance, 5.1, 0.45));
  const glossPerCone = draw(0.1, 0.4);
  const glossWidth = ratioBetween(chance, 0.15, 0.45);
  const meltLink = drawLink(chance);
  const glossLink = drawLink(chance);
  return {
    family: 'rounded',
    melted: (glaze, cone) =>
      meltLink((1 + growth * effect(cone) - extent(glaze)) / (growth * width)),
    glossy: (glaze, cone, cooling) => {
      const distance = glaze.silica - line(glaze) + glossPerCone * effect(cone);
      return glossLink(distance / glossWidth + cooling);
    },
  };
};

type Draw = (low: number, high: number) => number;

/** Size of the superellipse through a glaze: 1 on the melt boundary of cone 6. */
function extentOf(draw: Draw, mostSilica: number, alumina: number): (glaze: Glaze) => number {
  const power = draw(1.6, 4);
  const valley = { depth: draw(0.1, 0.3), scale: draw(0.08, 0.16) };
  const fluxGain = { boric: draw(0.13, 0.28), alkali: draw(0.2, 0.8), zinc: draw(0, 1.5) };
  const magnesiaGain = draw(-0.6, 0.8);
  const silicaReach = (glaze: Glaze) =>
    mostSilica * (1 - valley.depth * Math.exp(-glaze.alumina / valley.scale));
  const corner = boundaryGlaze(alumina);
  const aluminaReach = alumina / (1 - (3.5 / silicaReach(corner)) ** power) ** (1 / power);
  return (glaze) => {
    const fluxing =
      1 +
      fluxGain.boric * (Math.log(1 + glaze.boric / 0.1) - Math.log(2.75)) +
      fluxGain.alkali * (glaze.alkali - 0.3) +
      fluxGain.zinc * (glaze.zinc - 0.02) +
      magnesiaGain * (glaze.magnesia - 0.05);
    const silicaPart = (glaze.silica / silicaReach(glaze)) ** power;
    const aluminaPart = (glaze.alumina / aluminaReach) ** power;
    return (silicaPart + aluminaPart) ** (1 / power) / fluxing;
  };
}

/** Silica on the gloss boundary at cone 6; `ratio` is SiO2:Al2O3 there at 0.45 alumina. */
function matteLine(draw: Draw, ratio: number): (glaze: Glaze) => number {
  const origin = draw(0.5, 1.6);
  const slope = (ratio * 0.45 - origin) / 0.45;
  const boron = draw(0.5, 4);
  const magnesia = draw(0, 6);
  const lime = draw(0, 2);
  return (glaze) =>
    origin +
    slope * glaze.alumina -
    boron * (glaze.boric - 0.175) +
    magnesia * (glaze.magnesia - 0.05) -
    lime * (glaze.alkali - 0.3);
}
