import type { BriefKey } from './briefKeys.ts';
import { isRequired, plainValueOf } from './briefKeys.ts';
import { exampleOf } from './holds.ts';

/** Values that a key may have, in YAML's flow notation: `1 nm`, `{ waist: 200 um }`, `[{ ... }]`; at least one. */
export function keyExamples(key: BriefKey): string[] {
  const plain = plainValueOf(key);
  const value = plain === null ? null : exampleOf(plain.rule.holds);
  const values = value === null ? [] : [value];
  switch (key.kind) {
    case 'value':
      return values;
    case 'list':
    case 'none or list':
      return [`[${key.example}]`];
    case 'value or section':
      return [...values, key.example];
    case 'section':
    case 'none or section': {
      const inner = Object.entries(key.keys);
      const needed = inner.filter(([, one]) => isRequired(one));
      // A section that needs nothing shows its first key.
      const shown = needed.length > 0 ? needed : inner.slice(0, 1);
      return [`{ ${shown.map(([name, one]) => `${name}: ${keyExamples(one)[0]}`).join(', ')} }`];
    }
  }
}
