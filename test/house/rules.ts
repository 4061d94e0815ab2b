import ts from 'typescript';
import { mayImport } from './arrows';
import { importsOf, targetOf, walk, type Source } from './source';

/** A rule of the house: the places of a source that break it, each as `path:line what`. */
export type Rule = (source: Source) => string[];

/** Arrows between folders and to packages go only where the table allows. */
export const arrows: Rule = (source) =>
  importsOf(source)
    .filter(({ specifier }) => !mayImport(source.path, targetOf(source, specifier)))
    .map(({ specifier, line }) => `${source.path}:${line} imports ${specifier}`);

/** Only the producer of the queue adds jobs; only the relay and the worker's root make a producer. */
export const adding: Rule = (source) => {
  if (!/^(server|jobs|db)\//.test(source.path) || source.path === 'jobs/queue/producer.ts') {
    return [];
  }
  const found: string[] = [];
  walk(source, (node, line) => {
    if (ts.isIdentifier(node) && node.text === 'FlowProducer') {
      found.push(`${source.path}:${line} names FlowProducer`);
    }
    if (
      ts.isCallExpression(node) &&
      ts.isPropertyAccessExpression(node.expression) &&
      /^add(Bulk)?$/.test(node.expression.name.text) &&
      /(queue|flows?|producer)$/i.test(lastName(node.expression.expression)) &&
      source.path !== 'jobs/relay.ts'
    ) {
      found.push(`${source.path}:${line} adds a job`);
    }
  });
  return found;
};

function lastName(node: ts.Expression): string {
  if (ts.isIdentifier(node)) return node.text;
  if (ts.isPropertyAccessExpression(node)) return node.name.text;
  if (ts.isCallExpression(node)) return lastName(node.expression).replace(/Of$/, '');
  return '';
}

/** The environment is read in config.ts alone. */
export const environment: Rule = (source) => {
  if (/(^|\/)config\.ts$/.test(source.path)) return [];
  const found: string[] = [];
  walk(source, (node, line) => {
    if (ts.isIdentifier(node) && node.text === 'process' && envIsTakenFrom(node)) {
      found.push(`${source.path}:${line} reads process.env`);
    }
  });
  return found;
};

/** `process.env`, `process['env']` and `const { env } = process`. */
function envIsTakenFrom({ parent }: ts.Identifier): boolean {
  if (ts.isPropertyAccessExpression(parent)) return parent.name.text === 'env';
  if (ts.isElementAccessExpression(parent)) {
    const { argumentExpression: key } = parent;
    return ts.isStringLiteralLike(key) && key.text === 'env';
  }
  return (
    ts.isVariableDeclaration(parent) &&
    ts.isObjectBindingPattern(parent.name) &&
    parent.name.elements.some((one) => (one.propertyName ?? one.name).getText() === 'env')
  );
}

/** Markup made from a string has no place: neither by Vue, nor by Quasar's html props, nor by the DOM. */
export const markup: Rule = ({ path, text }) =>
  text
    .split('\n')
    .flatMap((line, index) =>
      /\bv-html\b|\.(inner|outer)HTML\s*=|insertAdjacentHTML|\bhtml:\s*true|<q-[^>]*\shtml\b/.test(
        line,
      )
        ? [`${path}:${index + 1} makes markup from a string`]
        : [],
    );

/** @returns dependencies that are not pinned to one version. */
export function unpinned(manifest: {
  dependencies: Record<string, string>;
  devDependencies: Record<string, string>;
}): string[] {
  return Object.entries({ ...manifest.dependencies, ...manifest.devDependencies })
    .filter(([, version]) => !/^\d+\.\d+\.\d+(-[\w.]+)?$/.test(version))
    .map(([name, version]) => `${name} ${version}`);
}
