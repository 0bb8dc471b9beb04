import { heldBack } from './held-back.ts';
import { curved } from './truths/curved.ts';
import { planes } from './truths/planes.ts';
import { rounded } from './truths/rounded.ts';
import { strange } from './truths/strange.ts';
import { thermal } from './truths/thermal.ts';
import type { Family } from './truths/truth.ts';

/** The families on which the model may be developed. */
export const DEVELOPMENT_FAMILIES = ['curved', 'planes', 'rounded', 'thermal', 'strange'];

/** Every family by its name; `held-back` is asked only for the final figures. */
export const FAMILIES: Readonly<Record<string, Family>> = {
  curved,
  planes,
  rounded,
  thermal,
  strange,
  'held-back': heldBack,
};
