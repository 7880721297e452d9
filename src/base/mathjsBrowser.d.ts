// The bundled build of mathjs has no types of its own: these few lines are all that quantity.ts uses.
declare module 'mathjs/lib/browser/math.js' {
  interface MathUnit {
    equalBase(other: MathUnit): boolean;
    toNumber(unit: string): number;
  }
  const math: { unit(text: string): MathUnit; unit(value: number, text: string): MathUnit };
  export default math;
}
