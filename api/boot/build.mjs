/** `npm run build`: client and server into dist/, from the beginning. */
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildWhatChanged } from './prepare.mjs';

const root = fileURLToPath(new URL('../..', import.meta.url));
fs.rmSync(path.join(root, 'dist'), { recursive: true, force: true });
await buildWhatChanged(root);
