// Compiles the AssemblyScript kernels of the relation engine to WebAssembly SIMD, and writes them as a module that holds the bytes
// in base64: loading must be synchronous in Node and in a worker, without a second file to fetch.
import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import asc from 'assemblyscript/asc';

const folder = fileURLToPath(new URL('../src/relation/lattice/kernels/', import.meta.url));
const wasm = join(tmpdir(), `kernels-${process.pid}.wasm`);
const { error } = await asc.main(
  [
    join(folder, 'assembly/kernels.ts'),
    '--outFile',
    wasm,
    '--baseDir',
    '/',
    '--enable',
    'simd',
    '--runtime',
    'stub',
    '--importMemory',
    '--noExportMemory',
    '--noAssert',
    '-O3',
  ],
  { stderr: process.stderr },
);
if (error) {
  console.error(error.message);
  process.exit(1);
}
const bytes = readFileSync(wasm);
rmSync(wasm);
mkdirSync(join(folder, 'generated'), { recursive: true });
const target = join(folder, 'generated/kernels.ts');
const text = `// Made by .ci/kernels.mjs from ../assembly. Not to be edited.\nexport const KERNELS_BASE64 =\n  '${bytes.toString('base64')}';\n`;
let before = '';
try {
  before = readFileSync(target, 'utf8');
} catch {
  // The first time there is none.
}
if (before !== text) writeFileSync(target, text);
console.log(`Relation kernels: ${bytes.length} bytes of WebAssembly`);
