import { compile } from 'json-schema-to-typescript';
import { format } from 'prettier';

const ending = '.schema.json';

/** @returns {string} `design` of `design.schema.json` */
export const nameOf = (/** @type {string} */ file) => file.slice(0, -ending.length);

/** @returns {boolean} */
export const isSchemaFile = (/** @type {string} */ file) => file.endsWith(ending);

// A schema in another file keeps its one declaration: the type's name stands in for it, and is imported.
function importTypes(node, schemas, imports) {
  if (Array.isArray(node)) return node.map((item) => importTypes(item, schemas, imports));
  if (typeof node !== 'object' || node === null) return node;
  if (typeof node.$ref === 'string' && !node.$ref.startsWith('#')) return importedType(node, schemas, imports);
  if (Array.isArray(node.prefixItems)) return tuple(node);
  return Object.fromEntries(Object.entries(node).map(([key, value]) => [key, importTypes(value, schemas, imports)]));
}

// The generator reads prefixItems as an array of nothing; ours hold plain numbers and texts.
const tuple = ({ description, prefixItems }) => ({
  description,
  tsType: `[${prefixItems.map(({ type }) => (type === 'integer' ? 'number' : type)).join(', ')}]`,
});

function importedType({ $ref, description }, schemas, imports) {
  const [file, pointer] = $ref.split('#');
  const path = pointer ? pointer.split('/').slice(1) : [];
  const type = path.reduce((at, key) => at?.[key], schemas.get(file))?.title;
  if (!type) throw new Error(`${$ref} names no schema that has a title.`);
  imports.set(type, nameOf(file));
  return { tsType: type, description };
}

const importLine = ([type, name]) => `import type { ${type} } from './${name}';\n`;

/**
 * The TypeScript source of one schema's types. The same schemas give the same text.
 *
 * @param {string} file name of the schema, a key of `schemas`
 * @param {ReadonlyMap<string, object>} schemas every schema by file name
 * @returns {Promise<string>}
 */
export async function modelSource(file, schemas) {
  const imports = new Map();
  const { $id: _id, ...schema } = importTypes(schemas.get(file), schemas, imports);
  const types = await compile(schema, nameOf(file), {
    bannerComment: '',
    format: false,
    ignoreMinAndMaxItems: true, // tuples of every allowed length would help nobody
  });
  const imported = [...imports].sort().map(importLine).join('');
  const spaced = types.replaceAll(/^}\n(?=\S)/gm, '}\n\n');
  const source = `// Generated from schemas/${file}; do not edit.\n\n${imported}\n${spaced}`;
  return format(source, { parser: 'typescript', singleQuote: true, printWidth: 120 });
}
