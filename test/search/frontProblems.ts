import { published } from './reference.ts';

/** A test problem with a known front; all variables run from 0 to 1. */
export interface FrontProblem {
  name: string;
  objectives: number;
  variables: number;
  /** Hypervolume of the whole front against 1.1 in every objective: test/reference/optimisation.json. */
  exact: number;
  f: (x: ArrayLike<number>) => number[];
}

/** 1 + 9 times the mean of all variables but the first. */
function distance(x: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 1; i < x.length; i++) sum += x[i];
  return 1 + (9 * sum) / (x.length - 1);
}

/** Zitzler, Deb & Thiele (2000), Evol. Comput. 8, 173: f2 = g h(f1/g, f1), the front at g = 1. */
function zdt(h: (ratio: number, first: number) => number): FrontProblem['f'] {
  return (x) => {
    const g = distance(x);
    return [x[0], g * h(x[0] / g, x[0])];
  };
}

const exact = (id: string) => Number(published(id)[0].value);

/** ZDT1 to ZDT3 with their usual 30 variables; DTLZ2 (Deb, Thiele, Laumanns & Zitzler 2005) with 3 objectives and 12. */
export const FRONT_PROBLEMS: readonly FrontProblem[] = [
  {
    name: 'ZDT1',
    objectives: 2,
    variables: 30,
    exact: exact("hv_ZDT1_['1.1'"),
    f: zdt((ratio) => 1 - Math.sqrt(ratio)),
  },
  {
    name: 'ZDT2',
    objectives: 2,
    variables: 30,
    exact: exact("hv_ZDT2_['1.1'"),
    f: zdt((ratio) => 1 - ratio ** 2),
  },
  {
    name: 'ZDT3',
    objectives: 2,
    variables: 30,
    exact: exact("hv_ZDT3_['1.1'"),
    f: zdt((ratio, first) => 1 - Math.sqrt(ratio) - ratio * Math.sin(10 * Math.PI * first)),
  },
  {
    name: 'DTLZ2',
    objectives: 3,
    variables: 12,
    exact: exact('hv_DTLZ2 M=3 (sphere octant)_1.1'),
    f: (x) => {
      let radius = 1;
      for (let i = 2; i < x.length; i++) radius += (x[i] - 0.5) ** 2;
      const [a, b] = [(x[0] * Math.PI) / 2, (x[1] * Math.PI) / 2];
      return [radius * Math.cos(a) * Math.cos(b), radius * Math.cos(a) * Math.sin(b), radius * Math.sin(a)];
    },
  },
];
