import { readFileSync, readdirSync } from "node:fs";
import path from "node:path";
import ts from "typescript";

/** A place in the source that asks for a word. */
export interface UsedWord {
  /** Such as features/loops/loop-screen.tsx:41. */
  readonly place: string;
  /** Null where the caller handed the function in, so that any namespace may answer. */
  readonly namespace: string | null;
  /** Matches the keys this call can ask for: one, or several where part of it is computed. */
  readonly key: RegExp;
  readonly text: string;
}

/** Source files that ask for words: the client, and the text of workings that is printed too. */
export function clientSources(root: string): string[] {
  return ["app", "features", path.join("shared", "workings")].flatMap((folder) =>
    readdirSync(path.join(root, folder), { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile() && /(?<!\.test)\.tsx?$/.test(entry.name))
      .map((entry) => path.relative(root, path.join(entry.parentPath, entry.name))),
  );
}

/**
 * Finds the words a file asks for: calls of what `useWords("namespace")` returned, and of functions
 * named `t` that were handed in. Reads the syntax tree, so comments and strings cannot mislead it.
 */
export function usedWords(root: string, file: string): UsedWord[] {
  const text = readFileSync(path.join(root, file), "utf8");
  const kind = file.endsWith("x") ? ts.ScriptKind.TSX : ts.ScriptKind.TS;
  const source = ts.createSourceFile(file, text, ts.ScriptTarget.Latest, true, kind);
  const found: UsedWord[] = [];
  const visit = (node: ts.Node): void => {
    if (ts.isCallExpression(node) && ts.isIdentifier(node.expression)) {
      const namespace = namespaceOf(node.expression);
      const argument = node.arguments[0];
      if (namespace !== undefined && argument) {
        const line = source.getLineAndCharacterOfPosition(node.getStart()).line + 1;
        for (const { pattern, shown } of keysOf(argument)) {
          const [first, rest] = shown.includes(":") ? shown.split(":", 2) : [namespace, shown];
          found.push({
            place: `${file}:${line}`,
            namespace: first ?? null,
            key: shown.includes(":") ? keyPattern([rest ?? ""]) : pattern,
            text: shown,
          });
        }
      }
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

/** The namespace behind an identifier; null for a `t` handed in, undefined for other functions. */
function namespaceOf(identifier: ts.Identifier): string | null | undefined {
  for (let scope: ts.Node | undefined = identifier.parent; scope; scope = scope.parent) {
    for (const declaration of declarationsIn(scope)) {
      if (!ts.isIdentifier(declaration.name) || declaration.name.text !== identifier.text) continue;
      const value = ts.isVariableDeclaration(declaration) ? declaration.initializer : undefined;
      if (value && ts.isCallExpression(value) && value.expression.getText() === "useWords") {
        const argument = value.arguments[0];
        return argument && ts.isStringLiteral(argument) ? argument.text : null;
      }
      return identifier.text === "t" ? null : undefined;
    }
  }
  return identifier.text === "t" ? null : undefined;
}

function declarationsIn(
  scope: ts.Node,
): readonly (ts.VariableDeclaration | ts.ParameterDeclaration)[] {
  if (ts.isFunctionLike(scope)) return scope.parameters;
  if (!ts.isBlock(scope) && !ts.isSourceFile(scope)) return [];
  return scope.statements
    .filter(ts.isVariableStatement)
    .flatMap((statement) => [...statement.declarationList.declarations]);
}

function keysOf(node: ts.Expression): { pattern: RegExp; shown: string }[] {
  if (ts.isStringLiteralLike(node)) return [{ pattern: keyPattern([node.text]), shown: node.text }];
  if (ts.isParenthesizedExpression(node) || ts.isAsExpression(node)) return keysOf(node.expression);
  if (ts.isConditionalExpression(node))
    return [...keysOf(node.whenTrue), ...keysOf(node.whenFalse)];
  if (ts.isTemplateExpression(node)) {
    const parts = [node.head.text, ...node.templateSpans.map((span) => span.literal.text)];
    return [{ pattern: keyPattern(parts), shown: parts.join("…") }];
  }
  return []; // a key in a variable: its own definition cannot be followed from here
}

/** Fixed parts with anything but nothing between them; a count may pick a plural form. */
function keyPattern(parts: readonly string[]): RegExp {
  const escaped = parts.map((part) => part.replace(/[.*+?^${}()|[\]\\]/g, "\\$&"));
  return new RegExp(`^${escaped.join(".+")}(_(zero|one|two|few|many|other))?$`);
}
