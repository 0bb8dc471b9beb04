import { between, happens, ratioBetween } from '../chance.ts';
import { boundaryGlaze, drawLink, type Family, type Glaze } from './truth.ts';

/**
 * Far from what is usual: the melt limit lies 1 to 1.5 scale units of alumina (0.17 to 0.25) off, minor
 * fluxes act strongly and either way, matte begins at an unusual ratio. Linear in mole fractions of
 * the whole glaze, with one sharp dip of fusibility at a ratio.
 */
export const strange: Family = (chance) => {
  const draw = (low: number, high: number) => between(chance, low, high);
  const away = draw(0.17, 0.25) * (happens(chance, 0.5) ? 1 : -1);
  const eased = easedCones(draw);
  const needed = eased(boundaryGlaze(0.7 + away));
  const heatGain = draw(0.6, 1.5);
  const width = ratioBetween(chance, 0.3, 1);
  const ratio = happens(chance, 0.5) ? draw(3.2, 4.2) : draw(6.5, 8.5);
  const former = glossRatio(draw);
  const glossPerCone = draw(-0.2, 0.7);
  const glossWidth = ratioBetween(chance, 0.07, 0.2) * ratio;
  const meltLink = drawLink(chance);
  const glossLink = drawLink(chance);
  return {
    family: 'strange',
    melted: (glaze, cone) =>
      meltLink((heatGain * (cone - 6) + eased(glaze) - needed) / (width * heatGain)),
    glossy: (glaze, cone, cooling) => {
      const score = (former(glaze) - ratio + glossPerCone * (cone - 6)) / glossWidth;
      return glossLink(score + cooling);
    },
  };
};

type Draw = (low: number, high: number) => number;

/** Cones by which a composition is easier to melt than some other. */
function easedCones(draw: Draw): (glaze: Glaze) => number {
  const per = {
    silica: draw(15, 30),
    alumina: draw(35, 70),
    boric: draw(15, 55),
    alkali: draw(-15, 40),
    magnesia: draw(-60, 60),
    zinc: draw(-60, 60),
  };
  const dip = { depth: draw(0.4, 1.4), place: draw(1.7, 2.5), width: draw(0.15, 0.35) };
  return ({ silica, alumina, boric, alkali, magnesia, zinc }) => {
    const moles = 1 + silica + alumina + boric;
    const fraction =
      per.boric * boric +
      per.alkali * alkali +
      per.magnesia * magnesia +
      per.zinc * zinc -
      per.silica * silica -
      per.alumina * alumina;
    const fromDip = (Math.log(silica / alumina) - dip.place) / dip.width;
    return fraction / moles + dip.depth * Math.exp(-fromDip * fromDip);
  };
}

/** SiO2:Al2O3, shifted by what else is in the glaze, either way. */
function glossRatio(draw: Draw): (glaze: Glaze) => number {
  const boron = draw(-4, 6);
  const magnesia = draw(-15, 15);
  const zinc = draw(-15, 15);
  const alkali = draw(-5, 5);
  return (glaze) =>
    glaze.silica / glaze.alumina +
    boron * (glaze.boric - 0.175) +
    magnesia * (glaze.magnesia - 0.05) +
    zinc * (glaze.zinc - 0.02) +
    alkali * (glaze.alkali - 0.3);
}
