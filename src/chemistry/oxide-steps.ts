import type { Oxide } from './oxides.ts';

/**
 * One step of each oxide, mol per mol flux: a change that a potter would fire a new tile for. Every
 * oxide counts, also those the model has no column for. Common practice, no source: colourants and
 * opacifiers act in small amounts, silica in large ones.
 */
export const OXIDE_STEP: Readonly<Record<Oxide, number>> = {
  SiO2: 0.5,
  Al2O3: 0.08,
  B2O3: 0.08,
  Li2O: 0.05,
  Na2O: 0.08,
  K2O: 0.08,
  MgO: 0.08,
  CaO: 0.12,
  SrO: 0.08,
  BaO: 0.08,
  ZnO: 0.05,
  PbO: 0.05,
  MnO: 0.05,
  Fe2O3: 0.04,
  TiO2: 0.04,
  ZrO2: 0.04,
  P2O5: 0.03,
  SnO2: 0.03,
  CoO: 0.02,
  NiO: 0.02,
  CuO: 0.03,
  Cr2O3: 0.01,
  V2O5: 0.02,
  CeO2: 0.03,
};
