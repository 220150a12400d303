import ts from 'typescript';

/** What a source file imports and which outside names it uses, from the syntax alone. */
export interface Scan {
  /** Every module it names: static, type-only, re-exported, dynamic, and in `import('…')` types. */
  readonly imports: readonly string[];
  /** Names it uses that it does not declare itself, e.g. `document`; members of `globalThis` among them. */
  readonly globals: ReadonlySet<string>;
  /** Calls and constructions written out, e.g. `Date.now`, `new Date()`. */
  readonly clocks: readonly string[];
}

/** The scripts of a Svelte file, and the expressions of its markup as far as they load modules. */
export function scriptOf(file: string, text: string): string {
  if (!file.endsWith('.svelte')) return text;
  const scripts = [...text.matchAll(/<script\b[^>]*>([\s\S]*?)<\/script>/g)].map((m) => m[1] ?? '');
  const markup = text.replace(/<script\b[^>]*>[\s\S]*?<\/script>/g, '');
  const loads = [...markup.matchAll(/\bimport\(\s*(['"`])([^'"`]+)\1\s*\)/g)].map((m) => `import('${m[2] ?? ''}');`);
  return [...scripts, ...loads].join('\n');
}

export function scan(file: string, text: string): Scan {
  const source = ts.createSourceFile(`${file}.ts`, scriptOf(file, text), ts.ScriptTarget.Latest, true);
  const imports: string[] = [];
  const used = new Set<string>();
  const declared = new Set<string>();
  const clocks: string[] = [];

  const visit = (node: ts.Node): void => {
    const module = moduleOf(node);
    if (module !== undefined) imports.push(module);
    if (ts.isIdentifier(node)) {
      if (declares(node)) declared.add(node.text);
      else if (refers(node)) used.add(node.text);
    }
    if (ts.isPropertyAccessExpression(node)) {
      if (node.expression.getText(source) === 'globalThis') used.add(node.name.text);
      const written = node.getText(source);
      if (written === 'Date.now') clocks.push(written);
    }
    if (ts.isNewExpression(node) && isDate(node.expression) && (node.arguments?.length ?? 0) === 0)
      clocks.push('new Date()');
    if (ts.isCallExpression(node) && isDate(node.expression)) clocks.push('Date()');
    ts.forEachChild(node, visit);
  };
  visit(source);
  return { imports, globals: new Set([...used].filter((name) => !declared.has(name))), clocks };
}

const isDate = (node: ts.Expression): boolean => ts.isIdentifier(node) && node.text === 'Date';

function moduleOf(node: ts.Node): string | undefined {
  if ((ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) && node.moduleSpecifier) {
    return textOf(node.moduleSpecifier);
  }
  if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) return textOf(node.argument.literal);
  if (ts.isImportEqualsDeclaration(node) && ts.isExternalModuleReference(node.moduleReference)) {
    return textOf(node.moduleReference.expression);
  }
  if (ts.isCallExpression(node) && node.arguments[0]) {
    const callee = node.expression;
    const loads = callee.kind === ts.SyntaxKind.ImportKeyword || (ts.isIdentifier(callee) && callee.text === 'require');
    // A computed name cannot be checked, so it is no allowed name.
    if (loads) return textOf(node.arguments[0]) ?? '(computed)';
  }
  // new URL('./worker.ts', import.meta.url) loads a file too.
  if (ts.isNewExpression(node) && ts.isIdentifier(node.expression) && node.expression.text === 'URL') {
    const [first, second] = node.arguments ?? [];
    if (first && second?.getText() === 'import.meta.url') return textOf(first);
  }
  return undefined;
}

const textOf = (node: ts.Node): string | undefined => (ts.isStringLiteralLike(node) ? node.text : undefined);

function declares(node: ts.Identifier): boolean {
  const { parent } = node;
  const named =
    ts.isVariableDeclaration(parent) ||
    ts.isParameter(parent) ||
    ts.isBindingElement(parent) ||
    ts.isFunctionDeclaration(parent) ||
    ts.isFunctionExpression(parent) ||
    ts.isClassDeclaration(parent) ||
    ts.isClassExpression(parent) ||
    ts.isInterfaceDeclaration(parent) ||
    ts.isTypeAliasDeclaration(parent) ||
    ts.isTypeParameterDeclaration(parent) ||
    ts.isEnumDeclaration(parent) ||
    ts.isImportSpecifier(parent) ||
    ts.isImportClause(parent) ||
    ts.isNamespaceImport(parent);
  return named && parent.name === node;
}

/** Whether an identifier stands for a value or type, not for a member or a key. */
function refers(node: ts.Identifier): boolean {
  const { parent } = node;
  if (ts.isPropertyAccessExpression(parent)) return parent.expression === node;
  if (ts.isQualifiedName(parent)) return parent.left === node;
  if (ts.isPropertyAssignment(parent)) return parent.initializer === node;
  if (ts.isBindingElement(parent)) return parent.initializer === node;
  if (ts.isShorthandPropertyAssignment(parent)) return true;
  const key =
    ts.isPropertySignature(parent) ||
    ts.isPropertyDeclaration(parent) ||
    ts.isMethodDeclaration(parent) ||
    ts.isMethodSignature(parent) ||
    ts.isGetAccessorDeclaration(parent) ||
    ts.isSetAccessorDeclaration(parent) ||
    ts.isEnumMember(parent);
  if (key) return parent.name !== node;
  return !(ts.isNamedTupleMember(parent) || ts.isLabeledStatement(parent) || ts.isMetaProperty(parent));
}
