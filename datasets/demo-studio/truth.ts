/** The demo studio's truth: what a fitted model can be held against. */
export { trueProbability, type SurfaceTruth } from './surfaces.ts';
export { drawStudio, drawStudioWithTruth, type DrawnStudio, type StudioTruth } from './studio.ts';
