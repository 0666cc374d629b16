// npm start: the whole demo on this machine. PORT (default 8080) and TRAYWARD_DATA choose port and data folder.
import { ensureDebian, ensurePackages } from './lib/packages.mjs';
import { dataFolder } from './lib/paths.mjs';
import { PlainError, runScript } from './lib/say.mjs';

await runScript(async () => {
  const port = Number(process.env.PORT ?? 8080);
  if (!Number.isInteger(port) || port < 1 || port > 65_535) throw new PlainError(`PORT must be a whole number from 1 to 65535, not ${process.env.PORT}.`);
  ensurePackages();
  const { postgresBinaries } = await import('./lib/postgres.mjs');
  ensureDebian({ postgresql: () => postgresBinaries() !== undefined });
  const { runDemo } = await import('./lib/demo.mjs');
  process.exitCode = await runDemo({ folder: dataFolder(), port, host: process.env.HOST ?? '127.0.0.1' });
  process.exit();
});
