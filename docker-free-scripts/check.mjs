// npm run check -- <kind>: one kind of check, with its own result line.
import { ensurePackages } from './lib/packages.mjs';
import { runScript, say } from './lib/say.mjs';

await runScript(async () => {
  ensurePackages();
  const { runKind } = await import('./lib/kinds.mjs');
  const { passed, failed } = await runKind(process.argv[2] ?? '');
  say(`${passed} passed, ${failed} failed`);
  process.exitCode = failed === 0 ? 0 : 1;
});
