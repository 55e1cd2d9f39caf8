import { createHash } from 'node:crypto';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const projectRoot = fileURLToPath(new URL('../../../', import.meta.url));

/** What the browser may fetch without being signed in: folder under /static/ and where it lies. */
export const staticFolders = [
  { prefix: 'styles', folder: join(projectRoot, 'templates', 'styles') },
  { prefix: 'fonts', folder: join(projectRoot, 'templates', 'fonts') },
  { prefix: 'islands', folder: join(projectRoot, 'dist', 'web', 'islands') },
] as const;

const marks = new Map<string, string>();

function markOf(name: string): string {
  const known = marks.get(name);
  if (known !== undefined) return known;
  const [prefix, ...rest] = name.split('/');
  const folder = staticFolders.find((entry) => entry.prefix === prefix)?.folder ?? projectRoot;
  const file = join(folder, ...rest);
  const mark = existsSync(file)
    ? createHash('sha256').update(readFileSync(file)).digest('hex').slice(0, 12)
    : 'missing';
  marks.set(name, mark);
  return mark;
}

/** Address of a static file, with a mark of its content: a browser keeps it until it changes. */
export function staticPath(name: string): string {
  return `/static/${name}?v=${markOf(name)}`;
}
