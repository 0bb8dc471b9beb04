declare module 'ml-regression' {
  /** Only what coneshift calls; the package ships no types. */
  export class TheilSenRegression {
    constructor(x: number[], y: number[]);
    readonly slope: number;
  }
}
