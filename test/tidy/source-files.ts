import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';

export const ROOT = path.join(import.meta.dirname, '..', '..');

export type SourceFile = { file: string; text: string; imports: { from: string; typeOnly: boolean }[] };

const IMPORT = /^\s*(?:import|export)\s+(type\s)?([^'"`;]*?\sfrom\s+)?['"]([^'"]+)['"]/gm;
const DYNAMIC = /\bimport\(\s*['"]([^'"]+)['"]\s*\)/g;

function importsOf(text: string): SourceFile['imports'] {
  const found = [...text.matchAll(IMPORT)].map(([, type, clause = '', from]) => ({
    from: from!,
    // `import { type A, type B } from` brings no value either.
    typeOnly: type !== undefined || /^\{\s*(type\s+\w+(\s+as\s+\w+)?\s*,?\s*)+\}\s*from/.test(clause.trim()),
  }));
  return [...found, ...[...text.matchAll(DYNAMIC)].map(([, from]) => ({ from: from!, typeOnly: false }))];
}

/** Every source file below some folders, with what it imports; relative imports are told from the root. */
export function sourceFiles(...folders: string[]): SourceFile[] {
  return folders.flatMap((folder) =>
    readdirSync(path.join(ROOT, folder), { recursive: true, encoding: 'utf8' })
      .filter((name) => /\.(ts|tsx)$/.test(name))
      .map((name) => {
        const file = path.posix.join(folder, name.split(path.sep).join('/'));
        const text = readFileSync(path.join(ROOT, file), 'utf8');
        const imports = importsOf(text).map(({ from, typeOnly }) => ({
          typeOnly,
          from: from.startsWith('.') ? path.posix.join(path.posix.dirname(file), from) : from,
        }));
        return { file, text, imports };
      }),
  );
}
