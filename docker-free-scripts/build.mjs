// npm run build: the web app in dist/, the server compiled to dist-server/. `npm run serve` runs both.
import { cpSync, mkdirSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { ensurePackages } from './lib/packages.mjs';
import { inRoot, root } from './lib/paths.mjs';
import { runScript, say } from './lib/say.mjs';

const compiled = ['server', 'shared', 'docker-free-scripts/prepare-database.ts'];

async function compileServer(folder) {
  const { transformFileSync } = await import('@swc/core');
  rmSync(folder, { recursive: true, force: true });
  for (const file of compiled.flatMap(filesUnder)) {
    const target = path.join(folder, file.replace(/\.ts$/, '.js'));
    mkdirSync(path.dirname(target), { recursive: true });
    if (!file.endsWith('.ts')) {
      cpSync(inRoot(file), target); // what code reads at run time: tables, templates
    } else if (!file.endsWith('.d.ts')) {
      const { code, map } = transformFileSync(inRoot(file), { configFile: inRoot('.swcrc'), cwd: root });
      writeFileSync(target, `${code}\n//# sourceMappingURL=${path.basename(target)}.map\n`);
      writeFileSync(`${target}.map`, map);
    }
  }
  cpSync(inRoot('assets'), path.join(folder, 'assets'), { recursive: true });
}

function filesUnder(entry) {
  if (!statSync(inRoot(entry)).isDirectory()) return [entry];
  return readdirSync(inRoot(entry)).flatMap((name) => filesUnder(path.join(entry, name)));
}

await runScript(async () => {
  ensurePackages();
  const { exportWeb } = await import('./lib/webExport.mjs');
  say('Exporting the web app to dist/ …');
  rmSync(inRoot('dist'), { recursive: true, force: true });
  await exportWeb(inRoot('dist'));
  say('Compiling the server to dist-server/ …');
  await compileServer(inRoot('dist-server'));
  say('Built. npm run serve starts it; .env.example lists what it must be told.');
});
