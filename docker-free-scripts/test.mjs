// npm test: every kind of check on a bare machine, and one line at the end that says how it went.
import { ensurePackages } from './lib/packages.mjs';
import { runScript, say } from './lib/say.mjs';

await runScript(async () => {
  ensurePackages();
  const { kinds, runKind } = await import('./lib/kinds.mjs');
  const total = { passed: 0, failed: 0, names: [] };
  for (const [name, { onlyWhenAsked }] of Object.entries(kinds)) {
    if (onlyWhenAsked) continue;
    say(`\n— ${name} —`);
    const startedAt = Date.now();
    const result = await runKind(name).catch((error) => ({ passed: 0, failed: 1, names: [`${name}: ${error.message}`] }));
    say(`${name}: ${result.passed} passed, ${result.failed} failed in ${Math.round((Date.now() - startedAt) / 1000)} s`);
    total.passed += result.passed;
    total.failed += result.failed;
    total.names.push(...result.names);
  }
  if (total.names.length > 0) say(`\nLook at:\n${total.names.map((name) => `  ${name}`).join('\n')}`);
  say('');
  say(`${total.passed} passed, ${total.failed} failed`);
  process.exitCode = total.failed === 0 ? 0 : 1;
});
