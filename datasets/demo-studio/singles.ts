import { batchFor, onTop, type Aim, type BatchLine } from './batch.ts';

/** Materials of a single glaze: with potash spar or soda spar, with dolomite, zinc or the rest. */
const POTASH = ['Wendle potash spar', 'Quern lime frit', 'Pemberlow kaolin', 'quartz', 'calcite'];
const SODA = [
  'Oxter soda spar',
  'Quern lime frit',
  'Nettlesham ball clay',
  'quartz',
  'wollastonite',
];
const MAGNESIA = [
  'Oxter soda spar',
  'Quern soda frit',
  'Pemberlow kaolin',
  'quartz',
  'calcite',
  'talc',
];
const ZINC = [
  'Wendle potash spar',
  'Quern soda frit',
  'Pemberlow kaolin',
  'quartz',
  'calcite',
  'zinc oxide',
];
const STRONTIA = [
  'Oxter soda spar',
  'Quern soda frit',
  'Pemberlow kaolin',
  'quartz',
  'calcite',
  'strontium carbonate',
];
const LITHIA = ['spodumene', 'Quern soda frit', 'Pemberlow kaolin', 'quartz', 'calcite'];

type Single = readonly [
  name: string,
  aim: Aim,
  palette: readonly string[],
  additions?: Readonly<Record<string, number>>,
];

/** The glazes that the studio uses or once tried. Every name is invented. */
const AIMS: readonly Single[] = [
  ['Gullwater', { silica: 3.3, alumina: 0.38, boric: 0.17, alkali: 0.3 }, POTASH],
  ['Slate Hen', { silica: 2.5, alumina: 0.47, boric: 0.15, alkali: 0.26 }, POTASH],
  ['Oatrick', { silica: 3.1, alumina: 0.51, boric: 0.17, alkali: 0.28 }, POTASH],
  ['Millrace', { silica: 3.6, alumina: 0.42, boric: 0.22, alkali: 0.3 }, SODA],
  [
    'Millrace green',
    { silica: 3.6, alumina: 0.42, boric: 0.22, alkali: 0.3 },
    SODA,
    { malachite: 3 },
  ],
  ['Candlesnow', { silica: 3.2, alumina: 0.36, boric: 0.18, alkali: 0.3 }, POTASH, { zircon: 9 }],
  [
    'Candlesnow tin',
    { silica: 3.2, alumina: 0.36, boric: 0.18, alkali: 0.3 },
    POTASH,
    { 'tin oxide': 5 },
  ],
  [
    'Thornback',
    { silica: 2.4, alumina: 0.52, boric: 0.12, alkali: 0.25 },
    POTASH,
    { 'red iron oxide': 6 },
  ],
  ['Ebbwick', { silica: 2.9, alumina: 0.4, boric: 0.2, alkali: 0.26, magnesia: 0.2 }, MAGNESIA],
  [
    'Ebbwick blue',
    { silica: 2.9, alumina: 0.4, boric: 0.2, alkali: 0.26, magnesia: 0.2 },
    MAGNESIA,
    { 'cobalt carbonate': 1 },
  ],
  [
    'Pewterleaf',
    { silica: 2.6, alumina: 0.42, boric: 0.16, alkali: 0.24, magnesia: 0.26 },
    MAGNESIA,
  ],
  ['Bellringer', { silica: 3.9, alumina: 0.48, boric: 0.16, alkali: 0.3 }, POTASH],
  [
    'Bellringer rust',
    { silica: 3.9, alumina: 0.48, boric: 0.16, alkali: 0.3 },
    POTASH,
    { 'red iron oxide': 8 },
  ],
  ['Old Liner', { silica: 3.7, alumina: 0.44, boric: 0.08, alkali: 0.3 }, POTASH],
  ['New Liner', { silica: 3.5, alumina: 0.44, boric: 0.2, alkali: 0.26, strontia: 0.1 }, STRONTIA],
  ['Hedgecandle', { silica: 2.8, alumina: 0.34, boric: 0.24, alkali: 0.36, zinc: 0.12 }, ZINC],
  ['Moth Grey', { silica: 2.7, alumina: 0.5, boric: 0.24, alkali: 0.32, zinc: 0.1 }, ZINC],
  ['Drystone', { silica: 2.2, alumina: 0.5, boric: 0.06, alkali: 0.26 }, POTASH],
  [
    'Drystone ochre',
    { silica: 2.2, alumina: 0.5, boric: 0.06, alkali: 0.26 },
    POTASH,
    { rutile: 5 },
  ],
  ['Fogbell', { silica: 2.9, alumina: 0.55, boric: 0.2, alkali: 0.3 }, SODA],
  ['Lampwick', { silica: 2.6, alumina: 0.28, boric: 0.26, alkali: 0.38 }, SODA],
  [
    'Lampwick amber',
    { silica: 2.6, alumina: 0.28, boric: 0.26, alkali: 0.38 },
    SODA,
    { 'red iron oxide': 4, rutile: 2 },
  ],
  [
    'Teal Purse',
    { silica: 3.0, alumina: 0.34, boric: 0.14, alkali: 0.3, strontia: 0.14 },
    STRONTIA,
    { malachite: 4 },
  ],
  ['Quiet Lime', { silica: 3.4, alumina: 0.52, boric: 0.04, alkali: 0.22 }, POTASH],
  ['Ten o Clock', { silica: 4.3, alumina: 0.5, boric: 0.26, alkali: 0.34 }, SODA],
  ['Ferryman', { silica: 3.4, alumina: 0.58, boric: 0.14, alkali: 0.3 }, SODA],
  [
    'Ferryman dark',
    { silica: 3.4, alumina: 0.58, boric: 0.14, alkali: 0.3 },
    SODA,
    { 'red iron oxide': 9, 'cobalt carbonate': 0.5 },
  ],
  ['Larksilver', { silica: 4.0, alumina: 0.52, boric: 0.1, alkali: 0.2 }, LITHIA],
  ['Eelskin', { silica: 2.5, alumina: 0.36, boric: 0.1, alkali: 0.3, magnesia: 0.1 }, MAGNESIA],
  ['Broadwick', { silica: 3.0, alumina: 0.44, boric: 0.12, alkali: 0.24, zinc: 0.06 }, ZINC],
  ['Barleymoth', { silica: 3.3, alumina: 0.46, boric: 0.3, alkali: 0.4 }, SODA],
];

/** A glaze that never had an aim: so much ash, so much spar, so much clay. */
const ASH: readonly BatchLine[] = [
  { material: 'Haverel washed ash', parts: 36, over100: false },
  { material: 'Wendle potash spar', parts: 34, over100: false },
  { material: 'Nettlesham ball clay', parts: 16, over100: false },
  { material: 'quartz', parts: 14, over100: false },
];

/** Glazes that belong to no blend. */
export const SINGLES: readonly { readonly recipe: string; readonly lines: readonly BatchLine[] }[] =
  [
    ...AIMS.map(([recipe, aim, palette, additions]) => ({
      recipe,
      lines: batchFor(aim, palette, additions),
    })),
    { recipe: 'Ash Wednesday', lines: ASH },
    { recipe: 'Ash Wednesday iron', lines: [...ASH, ...onTop({ 'red iron oxide': 3 })] },
  ];
