import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, normalize } from 'node:path';

export interface SourceFile {
  /** Relative to src/, with slashes. */
  readonly path: string;
  readonly text: string;
  readonly imports: readonly Import[];
}

export interface Import {
  /** Relative to src/ for our own files, the package's name otherwise. */
  readonly target: string;
  readonly isOwn: boolean;
  readonly isTypeOnly: boolean;
}

const STATEMENT =
  /(?:^|[;\n])\s*(import|export)\s+(type\s+)?(?:[^'";]*?\sfrom\s+)?['"]([^'"]+)['"]|\bimport\(\s*['"]([^'"]+)['"]\s*\)|new URL\(\s*['"](\.[^'"]+)['"]\s*,\s*import\.meta\.url/g;

/** Every source file with what it imports, read from its text. */
export function sourceFiles(root: string): SourceFile[] {
  return readdirSync(root, { recursive: true, encoding: 'utf8' })
    .map((path) => path.replaceAll('\\', '/'))
    .filter((path) => /\.(ts|tsx|mjs|css)$/.test(path) && !path.endsWith('.d.ts'))
    .sort()
    .map((path) => {
      const text = readFileSync(join(root, path), 'utf8');
      return { path, text, imports: path.endsWith('.css') ? [] : importsOf(path, text) };
    });
}

function importsOf(path: string, text: string): Import[] {
  return [...withoutComments(text).matchAll(STATEMENT)].map((match) => {
    const specifier = (match[3] ?? match[4] ?? match[5] ?? '').replace(/\?.*$/, '');
    const isOwn = specifier.startsWith('.');
    const target = isOwn
      ? normalize(join(dirname(path), specifier)).replaceAll('\\', '/')
      : specifier.replace(/^((?:@[^/]+\/)?[^/]+).*$/, '$1');
    return { target, isOwn, isTypeOnly: match[2] !== undefined };
  });
}

/** The text with comments blanked; line numbers stay. Strings stay too. */
export function withoutComments(text: string): string {
  return text.replace(
    /('(?:\\.|[^'\\\n])*'|"(?:\\.|[^"\\\n])*"|`(?:\\.|[^`\\])*`)|\/\*[\s\S]*?\*\/|\/\/[^\n]*/g,
    (found, string: string | undefined) => string ?? found.replace(/[^\n]/g, ' '),
  );
}

/** Chains of imports that come back to where they began. */
export function importCycles(files: readonly SourceFile[]): string[] {
  const targets = new Map(
    files.map((file) => [file.path, file.imports.filter((i) => i.isOwn).map((i) => i.target)]),
  );
  const finished = new Set<string>();
  const cycles: string[] = [];
  const visit = (path: string, trail: readonly string[]) => {
    const start = trail.indexOf(path);
    if (start >= 0) cycles.push([...trail.slice(start), path].join(' -> '));
    if (start >= 0 || finished.has(path)) return;
    for (const target of targets.get(path) ?? []) visit(target, [...trail, path]);
    finished.add(path);
  };
  for (const path of targets.keys()) visit(path, []);
  return cycles;
}
