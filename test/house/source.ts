import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import ts from 'typescript';

export const ROOT = join(import.meta.dirname, '../..');

/** A source file of the repository: its path in it, and its TypeScript (of a .vue file its scripts). */
export interface Source {
  readonly path: string;
  readonly text: string;
}

/** Every .ts and .vue file below the folders, with its whole text. */
export function sourcesBelow(folders: readonly string[]): Source[] {
  return folders.flatMap((folder) =>
    readdirSync(join(ROOT, folder), { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile() && /\.(ts|vue)$/.test(entry.name))
      .map((entry) => join(entry.parentPath, entry.name))
      .sort()
      .map((file) => ({ path: relative(ROOT, file), text: readFileSync(file, 'utf8') })),
  );
}

/** The TypeScript of a source; line numbers are kept. */
export function scriptOf({ path, text }: Source): string {
  if (!path.endsWith('.vue')) return text;
  const blank = (part: string): string => part.replace(/[^\n]/g, ' ');
  let script = '';
  let end = 0;
  for (const match of text.matchAll(/(<script[^>]*>)([\s\S]*?)<\/script>/g)) {
    const begin = match.index + (match[1]?.length ?? 0);
    script += blank(text.slice(end, begin)) + (match[2] ?? '');
    end = begin + (match[2]?.length ?? 0);
  }
  return script + blank(text.slice(end));
}

export interface Import {
  readonly specifier: string;
  /** 1-based. */
  readonly line: number;
}

/** Static, dynamic, type and re-exporting imports of a source, and `require`. */
export function importsOf(source: Source): Import[] {
  const script = scriptOf(source);
  return ts.preProcessFile(script, true, true).importedFiles.map(({ fileName, pos }) => ({
    specifier: fileName,
    line: script.slice(0, pos).split('\n').length,
  }));
}

/** @returns the path in the repository that the specifier means, or the package as written. */
export function targetOf(
  source: Source,
  specifier: string,
): { package: string } | { path: string } {
  if (specifier.startsWith('#contract/')) {
    return { path: `server/contract/${specifier.slice('#contract/'.length)}` };
  }
  if (specifier.startsWith('.')) return { path: join(dirname(source.path), specifier) };
  return { package: specifier };
}

/** Calls `visit` with every node of the source's syntax tree and its 1-based line. */
export function walk(source: Source, visit: (node: ts.Node, line: number) => void): void {
  const file = ts.createSourceFile(source.path, scriptOf(source), ts.ScriptTarget.ES2022, true);
  const step = (node: ts.Node): void => {
    visit(node, file.getLineAndCharacterOfPosition(node.getStart(file)).line + 1);
    ts.forEachChild(node, step);
  };
  step(file);
}
