import { around, between, ratioBetween } from './chance.ts';
import { endPointC } from './truths/end-points.ts';
import { boundaryAlumina, boundaryGlaze, type Family, type Glaze } from './truths/truth.ts';

/**
 * Held back: nothing of the model may be chosen by looking at this family.
 *
 * A phase diagram: in ln silica and ln alumina a valley line runs through a eutectic, the liquidus
 * climbs from it with a kink and other slopes on each side; a glaze melts by a Gumbel law of the
 * degrees above its liquidus. It is matte by stiffness or by lime crystals, whichever comes first.
 */
export const heldBack: Family = (chance) => {
  const draw = (low: number, high: number) => between(chance, low, high);
  const alumina = boundaryAlumina(chance);
  const liquidus = liquidusC(draw, alumina * draw(0.52, 0.68));
  const needed = liquidus(boundaryGlaze(alumina)) - endPointC(6);
  const widthC = ratioBetween(chance, 8, 26);
  const stiff = {
    ratio: Math.log(around(chance, 5.1, 0.5)),
    width: ratioBetween(chance, 0.06, 0.2),
  };
  const glossPerC = draw(0.001, 0.003);
  const boron = draw(0, 0.8);
  const lime = { most: around(chance, 2.1, 0.25), width: ratioBetween(chance, 0.1, 0.3) };
  const crystal = crystalShare(draw);
  return {
    family: 'held-back',
    melted: (glaze, cone) => gumbel((endPointC(cone) - liquidus(glaze) + needed) / widthC),
    glossy: (glaze, cone, cooling) => {
      const hotter = endPointC(cone) - endPointC(6);
      const smooth = Math.log(glaze.silica / glaze.alumina) - stiff.ratio;
      const eased = boron * (glaze.boric - 0.175) + glossPerC * hotter;
      const clear = (glaze.silica - lime.most * crystal(glaze)) / lime.width + 0.02 * hotter;
      return gumbel((smooth + eased) / stiff.width + cooling) * gumbel(clear + cooling);
    },
  };
};

type Draw = (low: number, high: number) => number;

/** 1/2 at 0; a short upper and a long lower tail. */
function gumbel(score: number): number {
  return 1 - Math.exp(-Math.LN2 * Math.exp(0.72 * score));
}

/** Degrees C up to a constant; `valleyAlumina` is the valley's place at SiO2 3.5. */
function liquidusC(draw: Draw, valleyAlumina: number): (glaze: Glaze) => number {
  const valley = { silica: draw(3, 3.8), slope: draw(0.5, 1.1) };
  const climb = { alumina: draw(90, 200), silica: draw(15, 60) };
  const along = { up: draw(40, 120), down: draw(10, 40) };
  const boron = draw(120, 260);
  const alkali = { best: draw(0.25, 0.42), scarce: draw(100, 300), rich: draw(0, 120) };
  const magnesia = { best: draw(0, 0.12), climb: draw(20, 250) };
  const zinc = draw(-100, 250);
  return (glaze) => {
    const place = Math.log(glaze.silica / valley.silica);
    const aside =
      Math.log(glaze.alumina / valleyAlumina) - valley.slope * Math.log(glaze.silica / 3.5);
    const offAlkali = glaze.alkali - alkali.best;
    return (
      (aside > 0 ? climb.alumina * aside : -climb.silica * aside) +
      (place > 0 ? along.up * place : -along.down * place) -
      boron * (Math.sqrt(glaze.boric + 0.02) - Math.sqrt(0.195)) +
      (offAlkali < 0 ? -alkali.scarce : alkali.rich) * offAlkali +
      magnesia.climb * Math.abs(glaze.magnesia - magnesia.best) -
      zinc * glaze.zinc
    );
  };
}

/** How much of the flux wants to crystallise with the silica, 1 at the usual glaze. */
function crystalShare(draw: Draw): (glaze: Glaze) => number {
  const magnesiaWeight = draw(0.3, 2);
  const boronWeight = draw(0.3, 1.5);
  return ({ alkali, magnesia, zinc, boric }) =>
    (1 - alkali - magnesia - zinc + magnesiaWeight * magnesia - boronWeight * (boric - 0.175)) /
    0.65;
}
