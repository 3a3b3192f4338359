// `npm start`: builds, prints the prediction of the example campaign, then serves the pages until Ctrl-C.
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from './build.mjs';
import { serve } from './server.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));

const wanted = process.env.PORT ?? '8787';
const port = Number(wanted);
if (!/^\d+$/.test(wanted) || port > 65_535) {
  console.error(`PORT is ${wanted}; write a number from 0 to 65535, for example: PORT=8080 npm start`);
  process.exit(2);
}

/** The first campaign in sites/, by name. */
function exampleCampaign() {
  const folder = path.join(root, 'sites');
  return fs
    .readdirSync(folder)
    .filter((name) => name.endsWith('.json'))
    .sort()
    .find((name) => fs.readFileSync(path.join(folder, name), 'utf8').includes('plumbtick-campaign/1'));
}

try {
  await build();
} catch (error) {
  if (!error.errors) console.error(error);
  process.exit(1);
}

const example = exampleCampaign();
if (example === undefined) {
  console.error('sites/ holds no campaign to predict.');
  process.exit(1);
}
console.log(`$ plumbtick predict sites/${example}\n`);
const { status } = spawnSync(process.execPath, ['dist/cli.js', 'predict', `sites/${example}`], {
  cwd: root,
  stdio: 'inherit',
});
if (status !== 0) process.exit(status ?? 1);

const { server, address } = await serve({ port });
console.log(`\nThe pages are served at ${address}   (Ctrl-C ends)`);
for (const name of fs.readdirSync(path.join(root, 'sites')).sort())
  if (name.endsWith('.html') && name !== 'index.html') console.log(`  ${address}${name}`);
for (const signal of ['SIGINT', 'SIGTERM'])
  process.on(signal, () => {
    server.close();
    server.closeAllConnections();
    process.exit(0);
  });
