import { existsSync, statSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';
import { root } from './source-files';

export type ImportEdge = {
  /** Relative to the root. */
  readonly from: string;
  /** As written. */
  readonly specifier: string;
  readonly line: number;
  /** Relative to the root for our own files, the package's name for others. */
  readonly to: string;
  readonly isPackage: boolean;
  /** `import type`, gone at run time. */
  readonly typeOnly: boolean;
};

const ENDINGS = ['', '.ts', '.tsx', '.mjs', '.css', '/index.ts', '/index.tsx'];

function resolveOwn(from: string, specifier: string): string {
  const plain = specifier.startsWith('@/') ? specifier.slice(2) : path.posix.join(path.posix.dirname(from), specifier);
  const ending = ENDINGS.find((candidate) => {
    const file = path.join(root, plain + candidate);
    return existsSync(file) && statSync(file).isFile();
  });
  return plain + (ending ?? '');
}

function packageName(specifier: string): string {
  if (specifier.startsWith('node:')) return specifier;
  return specifier.split('/').slice(0, specifier.startsWith('@') ? 2 : 1).join('/');
}

/** Every import of a source text: import, export from, import(), require() and `new URL(…, import.meta.url)` (a worker). */
export function moduleImports(from: string, text: string): ImportEdge[] {
  const source = ts.createSourceFile(from, text, ts.ScriptTarget.Latest, true, from.endsWith('x') ? ts.ScriptKind.TSX : ts.ScriptKind.TS);
  const edges: ImportEdge[] = [];
  const add = (node: ts.Node, specifier: string, typeOnly: boolean) => {
    const own = specifier.startsWith('.') || specifier.startsWith('@/');
    edges.push({
      from, specifier, typeOnly, isPackage: !own, to: own ? resolveOwn(from, specifier) : packageName(specifier),
      line: source.getLineAndCharacterOfPosition(node.getStart()).line + 1,
    });
  };
  const visit = (node: ts.Node): void => {
    if (ts.isImportDeclaration(node) && ts.isStringLiteral(node.moduleSpecifier)) {
      add(node, node.moduleSpecifier.text, node.importClause?.phaseModifier === ts.SyntaxKind.TypeKeyword);
    } else if (ts.isExportDeclaration(node) && node.moduleSpecifier && ts.isStringLiteral(node.moduleSpecifier)) {
      add(node, node.moduleSpecifier.text, node.isTypeOnly);
    } else if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument) && ts.isStringLiteral(node.argument.literal)) {
      add(node, node.argument.literal.text, true);
    } else if (ts.isCallExpression(node)) {
      const [first] = node.arguments;
      const called = node.expression;
      const loads = called.kind === ts.SyntaxKind.ImportKeyword || (ts.isIdentifier(called) && called.text === 'require');
      if (loads && first && ts.isStringLiteralLike(first)) add(node, first.text, false);
    } else if (ts.isNewExpression(node) && ts.isIdentifier(node.expression) && node.expression.text === 'URL') {
      const [first, base] = node.arguments ?? [];
      if (first && ts.isStringLiteralLike(first) && first.text.startsWith('.') && base?.getText() === 'import.meta.url') add(node, first.text, false);
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return edges;
}
