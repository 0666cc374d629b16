import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { children } from './children.mjs';
import { prepareDatabase } from './database.mjs';
import { keepOrChoosePort, portIsFree } from './ports.mjs';
import { cluster } from './postgres.mjs';
import { PlainError, say } from './say.mjs';
import { keptState } from './secrets.mjs';
import { helperProcesses, launch, mainProcesses, stackEnvironment, untilReady } from './stack.mjs';
import { ensureWebExport } from './webExport.mjs';

const demoPassword = 'crossed-polars';
const demoPeople = ['admin@portellery.example', 'instructor@portellery.example', 'second.instructor@portellery.example',
  'student@portellery.example', 'other.student@portellery.example', 'admin@saltpan.example'];

export const clusterOf = (folder, state) =>
  cluster({ folder: path.join(folder, 'postgres'), superuserPassword: state.superuserPassword });

/** Starts the whole demo and stays until it is asked to stop or one of its processes ends. Returns the exit code. */
export async function runDemo({ folder, port, host }) {
  await refuseTakenPort(port, host);
  const { state, save } = keptState(folder);
  const leave = occupy(folder);
  const database = clusterOf(folder, state);
  const processes = children({ logFolder: path.join(folder, 'logs') });
  const asked = untilAskedToStop();
  const breakOff = new AbortController();
  void asked.then(() => breakOff.abort());
  let exitCode = 0;
  try {
    const starting = start({ folder, port, host, state, save, database, processes, signal: breakOff.signal });
    starting.catch(() => undefined); // when asked to stop, how the rest of the start ends matters to nobody
    await Promise.race([asked, starting]);
    const end = await Promise.race([asked, processes.death]);
    if (end.name) {
      say(`\nThe ${end.name} process ${end.reason}; everything is stopped. Its last lines:\n${end.lines}`);
      exitCode = 1;
    } else {
      say('\nStopping …');
    }
  } finally {
    await processes.stop();
    database.stop();
    leave();
  }
  return exitCode;
}

async function start({ folder, port, host, state, save, database, processes, signal }) {
  const ports = await preparePorts({ port, state, save, database });
  const files = path.join(folder, 'files');
  mkdirSync(files, { recursive: true });
  const environment = stackEnvironment({ mode: 'demo', state, ports, folder, host, publicUrl: process.env.PUBLIC_URL, webFolder: '' });
  launch({ processes, environment, names: helperProcesses });
  const prepared = prepareDatabase({ port: ports.postgres, passwords: state.passwords, superuserPassword: state.superuserPassword, seed: true, files });
  const [webFolder] = await Promise.all([ensureWebExport({ signal }), prepared]);
  launch({ processes, environment: { ...environment, WEB_DIR: webFolder }, names: mainProcesses });
  await untilReady({ processes, environment });
  greet({ environment, folder });
}

/** The demo's ports, kept from start to start where nobody has taken them in between. */
async function preparePorts({ port, state, save, database }) {
  const kept = state.ports;
  const postgres = database.runningPort() ?? database.ensure(await keepOrChoosePort(kept.postgres));
  const ports = { postgres };
  for (const name of ['paymentFake', 'smtp', 'inbox']) ports[name] = await keepOrChoosePort(kept[name]);
  save({ ports });
  return { ...ports, web: port };
}

async function refuseTakenPort(port, host) {
  try {
    if (await portIsFree(port, host)) return;
  } catch (error) {
    throw new PlainError(`Cannot listen on ${host}:${port} (${error.code}). Choose another with PORT.`);
  }
  throw new PlainError(`Port ${port} is taken. Choose another: PORT=${port + 1} npm start`);
}

/** One demo per data folder: a second one would stop the first one's database under it. */
function occupy(folder) {
  const file = path.join(folder, 'running.pid');
  const pid = existsSync(file) ? readFileSync(file, 'utf8').trim() : '';
  const command = pid && existsSync(`/proc/${pid}/cmdline`) ? readFileSync(`/proc/${pid}/cmdline`, 'utf8') : '';
  if (command.includes('docker-free-scripts')) {
    throw new PlainError(`The demo in ${folder} is running already (process ${pid}). Stop it first, or choose another folder with TRAYWARD_DATA.`);
  }
  writeFileSync(file, String(process.pid));
  return () => rmSync(file, { force: true });
}

export { occupy as occupyFolder };

/** npm passes a Ctrl-C on although the terminal has sent it already; the second one must not cut the stop short. */
function untilAskedToStop() {
  return new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => resolve({ signal }));
  });
}

function greet({ environment, folder }) {
  say(`
Trayward is ready:  ${environment.PUBLIC_URL}
Mail inbox:         ${environment.INBOX_URL}

Sign in as any of these, password ${demoPassword}:
${demoPeople.map((person) => `  ${person}`).join('\n')}

Data and logs are in ${folder}. Ctrl-C stops everything.`);
}
