import { readdirSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';

export type JsonSchema = { [key: string]: unknown };

/**
 * JSON schemas of every interface and type that `shared/api` exports, by name, made with the compiler's own type
 * checker. (The usual generator walks syntax and fails on types computed from constants, as `Attribute` is.)
 * A type that JSON cannot carry, or that this does not know, throws: better no document than a wrong one.
 */
export function responseSchemas(root: string): Record<string, JsonSchema> {
  const folder = path.join(root, 'shared', 'api');
  const files = readdirSync(folder).filter((name) => name.endsWith('.ts')).sort().map((name) => path.join(folder, name));
  const program = ts.createProgram(files, {
    strict: true, exactOptionalPropertyTypes: true, target: ts.ScriptTarget.ESNext, module: ts.ModuleKind.CommonJS,
    moduleResolution: ts.ModuleResolutionKind.Node10, types: [], noEmit: true, skipLibCheck: true,
    paths: { '@shared/*': ['./shared/*'], '@/*': ['./*'] }, baseUrl: root,
  });
  return new Schemas(program.getTypeChecker()).of(files.flatMap((name) => program.getSourceFile(name) ?? []));
}

type NamedNode = ts.InterfaceDeclaration | ts.TypeAliasDeclaration;

class Schemas {
  private readonly names = new Map<ts.Symbol, string>();

  constructor(private readonly checker: ts.TypeChecker) {}

  of(sources: readonly ts.SourceFile[]): Record<string, JsonSchema> {
    const nodes = sources.flatMap((source) => source.statements.filter(isExportedType));
    for (const node of nodes) {
      const symbol = this.checker.getSymbolAtLocation(node.name);
      if (symbol) this.names.set(symbol, node.name.text);
    }
    const made = nodes.map((node): [string, JsonSchema] => [node.name.text, this.declared(node)]);
    return Object.fromEntries(made.sort(([a], [b]) => (a < b ? -1 : 1)));
  }

  private declared(node: NamedNode): JsonSchema {
    const symbol = this.checker.getSymbolAtLocation(node.name);
    return { ...this.shape(this.checker.getTypeAtLocation(node)), ...this.described(symbol) };
  }

  /** A reference where the type has a name of its own, else the type written out. */
  private reference(type: ts.Type): JsonSchema {
    const symbol = type.aliasSymbol ?? type.getSymbol();
    const name = symbol && type.aliasTypeArguments === undefined ? this.names.get(symbol) : undefined;
    return name === undefined ? this.shape(type) : { $ref: `#/components/schemas/${name}` };
  }

  private shape(type: ts.Type): JsonSchema {
    if (type.isUnion()) return this.union(type);
    if (type.isStringLiteral() || type.isNumberLiteral()) return { const: type.value };
    if (type.flags & ts.TypeFlags.BooleanLiteral) return { const: this.checker.typeToString(type) === 'true' };
    if (type.flags & ts.TypeFlags.String) return { type: 'string' };
    if (type.flags & ts.TypeFlags.Number) return { type: 'number' };
    if (type.flags & ts.TypeFlags.Boolean) return { type: 'boolean' };
    if (type.flags & ts.TypeFlags.Null) return { type: 'null' };
    if (type.flags & (ts.TypeFlags.Unknown | ts.TypeFlags.Any)) return {};
    if (this.checker.isTupleType(type)) {
      const items = this.checker.getTypeArguments(type as ts.TypeReference);
      return { type: 'array', prefixItems: items.map((item) => this.reference(item)), minItems: items.length, maxItems: items.length };
    }
    if (this.checker.isArrayType(type)) {
      const [item] = this.checker.getTypeArguments(type as ts.TypeReference);
      return { type: 'array', items: item ? this.reference(item) : {} };
    }
    if (type.flags & ts.TypeFlags.Object || type.isIntersection()) return this.object(type);
    if (type.isTypeParameter()) return {};
    throw new Error(`No JSON schema for the type ${this.checker.typeToString(type)}`);
  }

  private union(type: ts.UnionType): JsonSchema {
    const parts = type.types.filter((part) => !(part.flags & ts.TypeFlags.Undefined));
    const isBoolean = parts.filter((part) => part.flags & ts.TypeFlags.BooleanLiteral).length === 2;
    const words: (string | number)[] = [];
    const schemas: JsonSchema[] = isBoolean ? [{ type: 'boolean' }] : [];
    for (const part of parts) {
      if (part.isStringLiteral() || part.isNumberLiteral()) words.push(part.value);
      else if (!isBoolean || !(part.flags & ts.TypeFlags.BooleanLiteral)) schemas.push(this.reference(part));
    }
    if (words.length > 0) schemas.push({ enum: words.sort() });
    // The checker orders a union by when it first met each part, which any unrelated change of code can alter.
    schemas.sort((a, b) => (JSON.stringify(a) < JSON.stringify(b) ? -1 : 1));
    const [only] = schemas;
    return schemas.length === 1 && only ? only : { anyOf: schemas };
  }

  private object(type: ts.Type): JsonSchema {
    const values = this.checker.getIndexTypeOfType(type, ts.IndexKind.String);
    const properties = this.checker.getPropertiesOfType(type);
    const required = properties.filter((property) => !(property.flags & ts.SymbolFlags.Optional)).map((property) => property.name);
    return {
      type: 'object',
      properties: Object.fromEntries(properties.map((property) => [property.name, this.property(property)])),
      ...(required.length > 0 ? { required } : {}),
      additionalProperties: values ? this.reference(values) : false,
    };
  }

  private property(property: ts.Symbol): JsonSchema {
    const schema = this.reference(this.checker.getTypeOfSymbol(property));
    const described = this.described(property);
    // In JSON Schema 2020-12, which OpenAPI 3.1 uses, words may stand beside a $ref.
    return { ...schema, ...described };
  }

  private described(symbol: ts.Symbol | undefined): JsonSchema {
    const words = ts.displayPartsToString(symbol?.getDocumentationComment(this.checker)).trim();
    return words === '' ? {} : { description: words };
  }
}

function isExportedType(node: ts.Statement): node is NamedNode {
  if (!ts.isInterfaceDeclaration(node) && !ts.isTypeAliasDeclaration(node)) return false;
  return node.modifiers?.some((modifier) => modifier.kind === ts.SyntaxKind.ExportKeyword) ?? false;
}
