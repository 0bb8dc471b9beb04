import { describe, expect, it } from 'vitest';
import { boundaryPage } from '../../src/render/boundary-page.ts';
import { PLAIN_LOOK } from '../../src/render/page.ts';
import { predictionPage } from '../../src/render/prediction-page.ts';
import { shiftPage } from '../../src/render/shift-page.ts';
import { textWidth } from '../../src/render/printable.ts';
import type { Boundary, PointShift } from '../../src/predict/answers.ts';
import { aBoundary, aConeAnswer, aPointShift, aTurn } from '../support/answers.ts';

const MODEL = { tiles: 120, archive: 'sha256:0' };
const shiftOf = (...points: PointShift[]) =>
  shiftPage({ schema: 'coneshift.shift/1', model: MODEL, points }, PLAIN_LOOK);
const boundariesOf = (...boundaries: Boundary[]) =>
  boundaryPage(
    {
      schema: 'coneshift.boundaries/1',
      model: MODEL,
      through: { SiO2: 3.2, Al2O3: 0.5, CaO: 1 },
      throughSource: 'the middle of the archive (tile T1)',
      boundaries,
      notes: [],
    },
    PLAIN_LOOK,
  );
const widest = (page: string) => Math.max(...page.split('\n').map(textWidth));
const lineWith = (page: string, text: string) =>
  page.split('\n').find((line) => line.includes(text)) ?? '';
const joined = (page: string) => page.replace(/\s+/g, ' ');

describe('the page of shift', () => {
  it('has a row a cone with probability, interval, surface and support', () => {
    expect(lineWith(shiftOf(aPointShift()), '80 %').trim()).toBe(
      '5    5 % (1-12)   15 % (6-28)   80 % (64-90)  gloss      inside',
    );
  });

  it('puts each turn between the cones where it happens', () => {
    const turns = [
      aTurn(4.6, { to: 'matte' }),
      aTurn(5.3, { from: 'matte', interval90: [null, 6.12], noCrossing: 0.17 }),
      aTurn(7.4, { from: 'gloss', to: 'matte', interval90: [6.9, null] }),
    ];
    const page = shiftOf(aPointShift({ turns }));
    const order = ['4.6 (90 %', '\n     5 ', '5.3 (90 %', '\n     6 ', '\n     7 ', '7.4 (90 %'];
    const places = order.map((text) => page.indexOf(text));
    expect(places).toEqual([...places].sort((a, b) => a - b));
    expect(places.every((place) => place > 0)).toBe(true);
    expect(joined(page)).toContain(
      'turns from matte to gloss at 5.3 (90 %: below 4 to 6.1; no such turn: 17 %)',
    );
    expect(joined(page)).toContain('turns from gloss to matte at 7.4 (90 %: 6.9 to beyond 8)');
  });

  it('says so if nothing turns, and tells it in words', () => {
    const page = shiftOf(aPointShift());
    expect(page).toContain('No turn between cone 4 and cone 8.');
    expect(page).toContain('In words: at 5, 6 and 7 most likely gloss.');
  });

  it('counts overfired tiles near, and names the nearest', () => {
    const near = (tile: string) => ({ tile, surface: 'overfired', cone: '7', distance: 1 });
    const page = shiftOf(aPointShift({ overfiredNear: ['O1', 'O2', 'O3', 'O4'].map(near) }));
    expect(joined(page)).toContain(
      '4 overfired tiles near it: O1 overfired at 7 (1.0), O2 overfired at 7 (1.0), ' +
        'O3 overfired at 7 (1.0) and 1 more',
    );
  });

  it('says a hazard once for all cones, and what holds for one cone with the cone', () => {
    const cones = [
      aConeAnswer('6', { notes: ['Holds copper.'] }),
      aConeAnswer('8', { notes: ['hotter than the hottest tile', 'Holds copper.'] }),
    ];
    const page = shiftOf(aPointShift({ cones }));
    expect(page.match(/Holds copper\./g)).toHaveLength(1);
    expect(page).toContain('- cone 8: hotter than the hottest tile');
  });

  it('shows the cautions once, also for several glazes', () => {
    const page = shiftOf(aPointShift(), aPointShift({ point: 'Satin' }));
    expect(page.match(/A prediction is no promise/g)).toHaveLength(1);
  });

  it('cuts a name that is longer than the page', () => {
    const page = shiftOf(aPointShift({ point: `Glaze${'x'.repeat(190)}7` }));
    expect(widest(page)).toBeLessThanOrEqual(80);
    expect(page).toMatch(/^Glazex+\.\.x+7$/m);
  });

  it('neutralises names and stays within 80 columns', () => {
    const point = '\u001b[2JGlaze';
    const long = 'x'.repeat(200);
    const nearest = [{ tile: long, surface: 'gloss', cone: '6', distance: 12.3 }];
    const page = shiftOf(
      aPointShift({ point, cones: [aConeAnswer('6', { nearest, support: 'outside' })] }),
    );
    expect(page).toContain('\\x1b[2JGlaze');
    expect(page).not.toContain('\u001b');
    expect(widest(page)).toBeLessThanOrEqual(80);
  });
});

describe('the page of predict', () => {
  const points = ['P0', 'P1'].map((point, i) => ({
    point,
    unity: { SiO2: 3 + i, Al2O3: 0.5, CaO: 1 },
  }));

  it('gives every point its own answers', () => {
    const answer = (point: string, cone: string, tile: string) => ({
      point,
      ...aConeAnswer(cone, { nearest: [{ tile, surface: 'matte', cone, distance: 1 }] }),
    });
    const predictions = [
      answer('P0', '5', 'N1'),
      answer('P0', '6', 'N2'),
      answer('P1', '5', 'N3'),
      answer('P1', '6', 'N4'),
    ];
    const page = predictionPage(
      { schema: 'coneshift.predictions/1', model: MODEL, predictions },
      points,
      PLAIN_LOOK,
    );
    const [, first = '', second = ''] = page.split(/^P\d$/m);
    expect(first).toContain('silica 3.00');
    expect(first).toContain('nearest at 6: N2 matte at 6 (1.0)');
    expect(first).not.toContain('N3');
    expect(second).toContain('silica 4.00');
    expect(second).toContain('nearest at 5: N3');
    expect(page).toContain('From 120 judged tiles');
  });

  it('shows a glaze without any tile to compare with', () => {
    const predictions = [
      { point: 'P0', ...aConeAnswer('06', { nearest: [], support: 'outside' }) },
    ];
    const page = predictionPage(
      { schema: 'coneshift.predictions/1', model: { ...MODEL, tiles: 0 }, predictions },
      points.slice(0, 1),
      PLAIN_LOOK,
    );
    expect(page).toContain('nearest at 06: none');
    expect(page).toContain('From 0 judged tiles');
  });
});

describe('the page of boundaries', () => {
  it('shows place, interval, sides and tiles near', () => {
    const page = boundariesOf(aBoundary());
    expect(page).toContain('along alumina, at silica 3.20');
    expect(lineWith(page, '0.66 to 0.78').trim()).toMatch(
      /^melt +0\.71 +underfired +0\.66 to 0\.78 +\. +12 +inside$/,
    );
    expect(page).toContain('melt at 6, alumina 0.71: A1 matte at 6 (0.9)');
    expect(lineWith(page, '+0.07 to +0.19').trim()).toMatch(
      /^alumina +melted to underfired +6 +\+0\.12 +\+0\.07 to \+0\.19$/,
    );
  });

  it('says what an end beyond the range and a share without a crossing are', () => {
    const page = boundariesOf(
      aBoundary({ interval90: [0.75, null], noCrossing: 0.244, perConeInterval90: [null, 0.2] }),
    );
    expect(lineWith(page, 'beyond')).toContain('0.75 to beyond 0.90');
    expect(lineWith(page, 'beyond')).toContain('24 %');
    expect(lineWith(page, '+0.12')).toContain('not known');
  });

  it('says in words where a line meets no boundary, which side it lies on, and how surely', () => {
    const none = { value: null, support: null, perCone: null, above: 'melted' };
    const page = boundariesOf(aBoundary({ ...none, noCrossing: 0.66 }));
    expect(joined(page)).toContain(
      'melt none from 0.10 to 0.90, melted all along (chance of none 66 %; if there is one, 90 %: 0.66 to 0.78)',
    );
    expect(page).not.toContain('Nearest tiles');
    expect(page).not.toContain('Moved by one cone');
    const sure = boundariesOf(aBoundary({ ...none, interval90: [null, null], noCrossing: 0.999 }));
    expect(joined(sure)).toContain('melted all along (chance of none >99 %)');
  });

  it('keeps to 80 columns beside a line that is underfired all along', () => {
    const wide = {
      lookedAt: [0.1, 5.75] as const,
      interval90: [null, null] as const,
      noCrossing: 0.34,
    };
    const page = boundariesOf(
      aBoundary({ ...wide, above: 'underfired', value: 2.31, support: 'outside', tilesNear: 120 }),
      aBoundary({ ...wide, above: 'underfired', value: null, support: null, kind: 'gloss' }),
    );
    expect(widest(page)).toBeLessThanOrEqual(80);
  });

  it('lists several crossings of one line, and ratios to a tenth', () => {
    const page = boundariesOf(
      aBoundary({
        along: 'SiO2',
        at: { Al2O3: 0.5 },
        value: 1.8,
        below: 'underfired',
        above: 'melted',
      }),
      aBoundary({ along: 'SiO2', at: { Al2O3: 0.5 }, value: 4.1 }),
      aBoundary({
        along: 'SiO2:Al2O3',
        at: { 'SiO2+Al2O3': 3.7 },
        value: 6.54,
        interval90: [5.99, 7.2],
        lookedAt: [1, 20],
      }),
    );
    expect(page.match(/along silica, at alumina 0\.50/g)).toHaveLength(1);
    expect(page).toContain('1.80');
    expect(page).toContain('4.10');
    expect(lineWith(page, '6.0 to 7.2')).toContain('6.5');
    expect(widest(page)).toBeLessThanOrEqual(80);
  });
});
