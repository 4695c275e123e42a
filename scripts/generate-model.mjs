// Writes shared/model/ from schemas/; with --check only says which files would change, and fails when one would.
import { existsSync, mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { isSchemaFile, modelSource, nameOf } from './support/model-source.mjs';
import { inRoot } from './support/root.mjs';
import { runMain } from './support/refusal.mjs';

const schemaFolder = inRoot('schemas');
const modelFolder = inRoot('shared', 'model');

async function wantedFiles() {
  const names = readdirSync(schemaFolder).filter(isSchemaFile).sort();
  const schemas = new Map(names.map((name) => [name, JSON.parse(readFileSync(join(schemaFolder, name), 'utf8'))]));
  const wanted = new Map();
  for (const name of names) wanted.set(`${nameOf(name)}.ts`, await modelSource(name, schemas));
  return wanted;
}

function presentFiles() {
  if (!existsSync(modelFolder)) return new Map();
  return new Map(readdirSync(modelFolder).map((name) => [name, readFileSync(join(modelFolder, name), 'utf8')]));
}

function write(name, source) {
  const path = join(modelFolder, name);
  if (source === undefined) rmSync(path);
  else writeFileSync(path, source);
}

await runMain(async () => {
  const [wanted, present] = [await wantedFiles(), presentFiles()];
  const names = [...new Set([...wanted.keys(), ...present.keys()])].sort();
  const changed = names.filter((name) => wanted.get(name) !== present.get(name));
  if (process.argv.includes('--check')) {
    for (const name of changed) console.error(`shared/model/${name} is not what schemas/ says: run npm run model.`);
    return changed.length > 0 ? 1 : 0;
  }
  mkdirSync(modelFolder, { recursive: true });
  for (const name of changed) write(name, wanted.get(name));
  return 0;
});
