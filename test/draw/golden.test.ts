import { describe, expect, it } from 'vitest';
import { drawDxf } from '../../src/draw/dxf.ts';
import { drawSvg } from '../../src/draw/svg.ts';
import { SAMPLES } from './sampleDrawings.ts';

/** Whole files as they were when last looked at; golden/README.md says how to make them again. */
describe('golden drawings', () => {
  it.each(['annulus', 'zones'] as const)('%s', async (name) => {
    await expect(drawDxf(SAMPLES[name])).toMatchFileSnapshot(`golden/${name}.dxf`);
    await expect(drawSvg(SAMPLES[name])).toMatchFileSnapshot(`golden/${name}.svg`);
  });
});
