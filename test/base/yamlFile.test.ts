import { describe, expect, it } from 'vitest';
import { RimwrightError } from '../../src/base/errors.ts';
import { MAX_YAML_BYTES, parseYaml } from '../../src/base/yamlFile.ts';

function refusal(text: string): RimwrightError {
  try {
    parseYaml(text, 'road.yaml');
  } catch (error) {
    expect(error).toBeInstanceOf(RimwrightError);
    expect((error as RimwrightError).code).toBe('input');
    return error as RimwrightError;
  }
  throw new Error('the text was accepted');
}

describe('parseYaml', () => {
  it('reads plain values and knows the lines of keys, items and missing keys', () => {
    const source = parseYaml(
      'title: Road\nlight:\n  wavelength: 635 nm\nparticles:\n  - { diameter: 1 um }\n\n  - diameter: 2 um\n    index: 1.5\n',
      'road.yaml',
    );
    expect(source.value).toEqual({
      title: 'Road',
      light: { wavelength: '635 nm' },
      particles: [{ diameter: '1 um' }, { diameter: '2 um', index: 1.5 }],
    });
    expect(source.lineOf([])).toBe(1);
    expect(source.lineOf(['light'])).toBe(2);
    expect(source.lineOf(['light', 'wavelength'])).toBe(3);
    expect(source.lineOf(['light', 'drift'])).toBe(2);
    expect(source.lineOf(['particles', 0, 'diameter'])).toBe(5);
    expect(source.lineOf(['particles', 1])).toBe(7);
    expect(source.lineOf(['particles', 1, 'index'])).toBe(8);
    expect(source.lineOf(['particles', 7, 'index'])).toBe(4);
    expect(source.lineOf(['nothing'])).toBe(1);
  });

  it('follows an alias to the line where its value stands', () => {
    const source = parseYaml('a: &grain\n  size: 1\nb: *grain\n', 'road.yaml');
    expect(source.value).toEqual({ a: { size: 1 }, b: { size: 1 } });
    expect(source.lineOf(['b'])).toBe(3);
    expect(source.lineOf(['b', 'size'])).toBe(2);
  });

  it('keeps a dangerous key as plain data', () => {
    const { value } = parseYaml('__proto__: { polluted: true }\n', 'road.yaml');
    expect(Object.keys(value as object)).toEqual(['__proto__']);
    expect((value as { polluted?: boolean }).polluted).toBeUndefined();
  });

  it('takes an empty file for null', () => {
    expect(parseYaml('', 'road.yaml').value).toBeNull();
    expect(parseYaml('# nothing yet\n', 'road.yaml').value).toBeNull();
    expect(parseYaml('', 'road.yaml').lineOf(['title'])).toBe(1);
  });

  it('reports keys given twice, one problem each, with their lines', () => {
    const error = refusal('a: 1\nb: 2\na: 3\nb: 4\n');
    expect(error.problems.map(({ line }) => line)).toEqual([3, 4]);
    expect(error.message).toBe(
      'road.yaml:3: found "a: 3", expected each key once\nroad.yaml:4: found "b: 4", expected each key once',
    );
  });

  it('reports a syntax error with its line', () => {
    const error = refusal('title: Road\nlight: [1, 2\nmedium: air\n');
    expect(error.problems[0].line).toBeGreaterThanOrEqual(2);
    expect(error.message).toMatch(/^road\.yaml:\d: found ".*", expected valid YAML/);
    expect(refusal('a: b: c\n').problems).toHaveLength(1);
  });

  it('refuses tags that it does not know', () => {
    expect(refusal('a: 1\nb: !secret 2\n').problems[0].line).toBe(2);
  });

  it('refuses more than one document', () => {
    const error = refusal('a: 1\n---\nb: 2\n');
    expect(error.problems).toHaveLength(1);
    expect(error.problems[0].found).toBe('a second document');
  });

  it('refuses texts that are too long, counted in bytes', () => {
    expect(refusal(`a: ${'µ'.repeat(MAX_YAML_BYTES / 2)}`).problems[0].expected).toContain('bytes');
  });

  it('refuses aliases that multiply, circle or lead nowhere', () => {
    const bomb = ['a: &a [1, 1, 1]', 'b: &b [*a, *a, *a]', 'c: &c [*b, *b, *b]', 'd: [*c, *c, *c]'].join(
      '\n',
    );
    expect(refusal(bomb).message).toContain('at most 20');
    expect(refusal(`a: &a 1\nb: [${'*a, '.repeat(21)}]\n`).message).toContain('21 aliases');
    expect(parseYaml(`a: &a 1\nb: [${'*a, '.repeat(20)}]\n`, 'road.yaml').value).toBeDefined();
    const chain = Array.from({ length: 7 }, (_, k) => `k${k + 1}: &k${k + 1} [*k${k}]`).join('\n');
    expect(refusal(`k0: &k0 1\n${chain}\n`).message).toContain('28 aliases');
    expect(refusal('b: 1\na: &a [*a]\n').problems).toMatchObject([{ line: 2, found: '*a' }]);
    expect(refusal('a: *nowhere\n').problems).toMatchObject([{ line: 1, found: '*nowhere' }]);
  });

  it('refuses nesting that would exhaust the stack', () => {
    const deep = [
      '['.repeat(200_000),
      `${'['.repeat(60)}${']'.repeat(60)}`,
      `${'- '.repeat(60)}1`,
      '{a: '.repeat(99_999),
    ];
    for (const text of deep) expect(refusal(text).message).toContain('nested too deeply');
    expect(parseYaml(`${'['.repeat(20)}${']'.repeat(20)}`, 'road.yaml').value).toHaveLength(1);
  });
});
