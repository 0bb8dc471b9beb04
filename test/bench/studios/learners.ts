import { fitUnvalidated } from '../../../src/model/fit.ts';
import { predict } from '../../../src/predict/predict.ts';
import { startingPoint } from '../starting-point/starting-point.ts';
import type { Learner } from './learner.ts';

/** The model as the program ships it. */
const current: Learner = (archive) => {
  const model = fitUnvalidated(archive);
  return (points, coneIndexes) => [
    ...predict(
      model,
      points.map((unity, i) => ({ point: String(i), unity })),
      coneIndexes,
    ).predictions,
  ];
};

/** Everything that can be compared, by the name it is asked with. */
export const LEARNERS: Readonly<Record<string, Learner>> = { start: startingPoint, current };
