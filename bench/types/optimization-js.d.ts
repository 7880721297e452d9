/** The part of optimization-js 1.5.0 that tests use as a baseline; the package brings no types. */
declare module 'optimization-js' {
  interface Dimension {
    random_sample(): number;
  }
  interface Optimizer {
    best_x: number[];
    best_y: number;
  }
  const optimjs: {
    Real(low: number, high: number): Dimension;
    /** Random points. */
    dummy_minimize(f: (x: number[]) => number, space: Dimension[], calls: number): Optimizer;
    /** Mutations of the best point. */
    rs_minimize(f: (x: number[]) => number, space: Dimension[], calls: number): Optimizer;
    /** Coordinate descent with difference quotients; has no cap on evaluations. */
    minimize_Powell(f: (x: number[]) => number, start: number[]): { argument: number[]; fncvalue: number };
  };
  export default optimjs;
}
