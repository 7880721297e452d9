import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/** Absolute path of the compiled worker: `npm test` compiles it before the tests run. */
export function builtWorker(): string {
  const path = fileURLToPath(new URL('../../dist/crew/worker.js', import.meta.url));
  if (!existsSync(path)) throw new Error(`${path} is missing: run npm run build`);
  return path;
}
