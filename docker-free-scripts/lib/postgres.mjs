import { spawnSync } from 'node:child_process';
import { chownSync, existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { isRoot } from './paths.mjs';
import { PlainError } from './say.mjs';

/** The folder of the newest PostgreSQL (15 or later) Debian has installed, or undefined. */
export function postgresBinaries(base = '/usr/lib/postgresql') {
  const versions = existsSync(base) ? readdirSync(base).map(Number).filter((version) => version >= 15) : [];
  return versions
    .sort((a, b) => b - a)
    .map((version) => path.join(base, String(version), 'bin'))
    .find((folder) => existsSync(path.join(folder, 'initdb')));
}

/** PostgreSQL refuses to run as root, so root steps down to the user that Debian's package made for it. */
function asServerUser(command, args) {
  const [file, ...rest] = isRoot ? ['runuser', '-u', 'postgres', '--', command, ...args] : [command, ...args];
  // Output goes to the server's own log; a pipe would be held open by the postmaster for as long as it lives.
  return spawnSync(file, rest, { cwd: '/', encoding: 'utf8', stdio: ['ignore', 'pipe', 'pipe'] });
}

function must(result, what) {
  if (result.status === 0) return result;
  const detail = `${result.stderr ?? ''}${result.stdout ?? ''}`.trim() || result.error?.message;
  throw new PlainError(detail ? `${what}: ${detail}` : what);
}

function serverUserIds() {
  const [, uid, gid] = must(spawnSync('getent', ['passwd', 'postgres'], { encoding: 'utf8' }), 'No postgres user')
    .stdout.match(/^[^:]*:[^:]*:(\d+):(\d+)/);
  return { uid: Number(uid), gid: Number(gid) };
}

function giveToServerUser(file) {
  if (!isRoot) return;
  const { uid, gid } = serverUserIds();
  chownSync(file, uid, gid);
}

/**
 * One private PostgreSQL cluster under `folder`: loopback only, no socket, passwords (scram) for everyone.
 * @param folder   made if missing; as root the `postgres` user must be able to enter its parents
 * @param settings server settings by name, for instance { fsync: 'off' } for tests
 */
export function cluster({ folder, superuserPassword, settings = {} }) {
  const data = path.join(folder, 'data');
  const log = path.join(folder, 'log');
  const bin = (name) => {
    const folderOfBinaries = postgresBinaries();
    if (!folderOfBinaries) throw new PlainError('PostgreSQL is not installed. Install it with: apt-get install postgresql');
    return path.join(folderOfBinaries, name);
  };

  function create() {
    if (existsSync(path.join(data, 'PG_VERSION'))) return;
    mkdirSync(folder, { recursive: true, mode: 0o700 });
    giveToServerUser(folder);
    must(asServerUser('test', ['-w', folder, '-a', '-x', folder]),
      `The postgres user may not enter ${folder}. Choose another data folder with TRAYWARD_DATA.`);
    // Built aside and moved into place whole: a start that is killed half-way must not leave half a cluster behind.
    const fresh = path.join(folder, 'data.new');
    const passwordFile = path.join(folder, 'superuser.tmp');
    rmSync(fresh, { recursive: true, force: true });
    writeFileSync(passwordFile, superuserPassword, { mode: 0o600 });
    giveToServerUser(passwordFile);
    try {
      must(asServerUser(bin('initdb'), ['-D', fresh, '-U', 'postgres', `--pwfile=${passwordFile}`, '--encoding=UTF8',
        '--locale=C.UTF-8', '--auth-local=scram-sha-256', '--auth-host=scram-sha-256', '--no-instructions',
        ...(settings.fsync === 'off' ? ['--no-sync'] : [])]), 'Could not make the database cluster');
    } finally {
      rmSync(passwordFile, { force: true });
    }
    renameSync(fresh, data);
  }

  /** The port of the server that runs on this data folder, or undefined. Asks the server: its pid file outlives a kill -9. */
  function runningPort() {
    const pidFile = path.join(data, 'postmaster.pid');
    if (!existsSync(pidFile)) return undefined;
    const port = Number(readFileSync(pidFile, 'utf8').split('\n')[3]);
    if (!port || asServerUser(bin('pg_ctl'), ['status', '-D', data]).status !== 0) return undefined;
    return answers(port) ? port : undefined;
  }

  const answers = (port) =>
    spawnSync(bin('pg_isready'), ['-q', '-h', '127.0.0.1', '-p', String(port), '-t', '3'], { cwd: '/' }).status === 0;

  function start(port) {
    const options = { listen_addresses: '127.0.0.1', port, unix_socket_directories: '', ...settings };
    const flags = Object.entries(options).map(([name, value]) => `-c ${name}='${value}'`).join(' ');
    const result = asServerUser(bin('pg_ctl'), ['start', '-w', '-t', '60', '-D', data, '-l', log, '-o', flags]);
    if (result.status !== 0) throw new PlainError(`PostgreSQL did not start:\n${lastLines(log)}`);
  }

  /** Starts the server unless it runs already; returns the port it listens on. */
  function ensure(port) {
    create();
    const running = runningPort();
    if (running) return running;
    start(port);
    return port;
  }

  function stop({ mode = 'fast' } = {}) {
    if (!existsSync(path.join(data, 'postmaster.pid'))) return;
    asServerUser(bin('pg_ctl'), ['stop', '-w', '-t', '60', '-m', mode, '-D', data]);
  }

  return { create, ensure, stop, runningPort, log };
}

function lastLines(file, count = 8) {
  return existsSync(file) ? readFileSync(file, 'utf8').trimEnd().split('\n').slice(-count).join('\n') : '(no log)';
}
