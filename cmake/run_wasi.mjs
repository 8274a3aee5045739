// Runs a WebAssembly program under node: node run_wasi.mjs PROGRAM [ARGUMENTS]

import { readFile } from 'node:fs/promises';
import { WASI } from 'node:wasi';

const wasi = new WASI({ version: 'preview1', args: process.argv.slice(2) });
const code = await readFile(process.argv[2]);
const { instance } = await WebAssembly.instantiate(code, {
    wasi_snapshot_preview1: wasi.wasiImport,
});
process.exitCode = wasi.start(instance);
