import ts from 'typescript';
import path from 'node:path';

/** Which parts of the house a part may call, itself apart. Packages are listed where they are rationed. */
export const mayCall: Record<string, readonly string[]> = {
  'server/contracts': [],
  'server/engine': [],
  'server/domain': ['server/engine', 'server/contracts (types)'],
  'server/store': [
    'server/domain',
    'server/engine (types)',
    'server/contracts (types)',
    'migrations',
  ],
  'server/adapters': [
    'server/ports.ts',
    'server/domain',
    'server/engine (types)',
    'server/contracts (types)',
  ],
  'server/use-cases': [
    'server/domain',
    'server/engine',
    'server/ports.ts',
    'server/store',
    'server/contracts',
  ],
  'server/ports.ts': ['server/domain (types)', 'server/store (types)', 'server/contracts (types)'],
  'server/http': [
    'server/use-cases',
    'server/contracts',
    'server/domain',
    'server/ports.ts',
    'server/config.ts',
    'server/engine (types)',
    'server/store (types)',
  ],
  'server/jobs': ['server/use-cases', 'server/contracts', 'server/domain', 'server/ports.ts'],
  'server/stripe-mock': ['server/stand-in-look'],
  'server/mail-stand-in': ['server/stand-in-look'],
  'server/stand-in-look': [],
  'server/config.ts': [],
  'client/lib': ['server/contracts'],
  'client/ui': ['client/lib', 'server/contracts'],
  'client/features': ['client/ui', 'client/lib', 'server/contracts'],
  'client/app': ['client/features', 'client/ui', 'client/lib', 'server/contracts'],
};

/** Packages a part may use, where it may not use any it likes. */
const packagesOf: Record<string, readonly string[]> = {
  'server/contracts': ['zod'],
  'server/engine': [],
  'server/domain': [],
  // Use cases may hash and wait; sockets and files belong to adapters.
  'server/use-cases': ['knex (types)', 'node:crypto', 'node:timers', 'bcryptjs'],
};

export interface Arrow {
  from: string;
  to: string;
  typeOnly: boolean;
}

/** Every import and re-export of one file, relative ones resolved against the project's folder. */
export function arrowsOf(file: string, source: string): Arrow[] {
  const tree = ts.createSourceFile(file, source, ts.ScriptTarget.Latest, false);
  const arrows: Arrow[] = [];
  const add = (specifier: ts.Expression | undefined, typeOnly: boolean) => {
    if (!specifier || !ts.isStringLiteral(specifier)) return;
    arrows.push({ from: file, to: resolved(file, specifier.text), typeOnly });
  };
  const visit = (node: ts.Node): void => {
    if (ts.isImportDeclaration(node)) add(node.moduleSpecifier, importsTypesOnly(node));
    if (ts.isExportDeclaration(node)) add(node.moduleSpecifier, node.isTypeOnly);
    if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      add(node.arguments[0], false);
    }
    ts.forEachChild(node, visit);
  };
  visit(tree);
  return arrows;
}

function importsTypesOnly({ importClause }: ts.ImportDeclaration): boolean {
  if (!importClause) return false;
  if (importClause.phaseModifier === ts.SyntaxKind.TypeKeyword) return true;
  const named = importClause.namedBindings;
  if (importClause.name || !named || !ts.isNamedImports(named)) return false;
  return named.elements.length > 0 && named.elements.every((element) => element.isTypeOnly);
}

function resolved(file: string, specifier: string): string {
  if (!specifier.startsWith('.')) return `package ${specifier}`;
  return path.posix.join(path.posix.dirname(file), specifier);
}

function partOf(file: string): string | null {
  const parts = Object.keys(mayCall);
  return parts.find((part) => file === part || file.startsWith(`${part}/`)) ?? null;
}

/** What is wrong with an arrow, in words; null when it points the right way. */
export function faultOf({ from, to, typeOnly }: Arrow): string | null {
  const part = partOf(from);
  if (part === null) return null;
  const allowed = to.startsWith('package ')
    ? mayUsePackage(part, to.slice('package '.length), typeOnly)
    : mayReach(part, from, to, typeOnly);
  return allowed ? null : `${from} may not import ${to}`;
}

function mayUsePackage(part: string, specifier: string, typeOnly: boolean): boolean {
  const allowed = packagesOf[part];
  if (!allowed) return !(part.startsWith('client/') && specifier.startsWith('node:'));
  const name = specifier.split('/')[0] ?? specifier;
  return allowed.includes(name) || (typeOnly && allowed.includes(`${name} (types)`));
}

function mayReach(part: string, from: string, to: string, typeOnly: boolean): boolean {
  if (to === part || to.startsWith(`${part}/`)) return sameFeature(part, from, to);
  return (mayCall[part] ?? []).some((entry) => {
    const target = entry.replace(' (types)', '');
    const inTarget = to === target || to.startsWith(`${target}/`);
    return inTarget && (typeOnly || entry === target);
  });
}

/** Features meet in client/app only. */
function sameFeature(part: string, from: string, to: string): boolean {
  if (part !== 'client/features') return true;
  return from.split('/')[2] === to.split('/')[2];
}
