import { execFile } from 'node:child_process';
import {
  chmodSync,
  existsSync,
  mkdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { createServer } from 'node:net';
import { join, resolve } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { serverAccount } from '../../scripts/postgres/account.mjs';
import { startCluster } from '../../scripts/postgres/cluster.mjs';
import { connect } from '../../scripts/postgres/roles.mjs';
import { hashOfSources } from '../../scripts/product/build.mjs';
import {
  ensureLedgerKey,
  variables,
  wantedStandIns,
  withoutConfiguration,
} from '../../scripts/product/environment.mjs';
import { newStack } from '../../scripts/product/stack.mjs';
import { isInstalled } from '../../scripts/set-up/dependencies.mjs';
import { root } from '../../scripts/set-up/files.mjs';
import { beginningOf, takeLock } from '../../scripts/set-up/lock.mjs';
import { demandFree, rememberedPorts } from '../../scripts/set-up/ports.mjs';
import { explain, Problem } from '../../scripts/set-up/problem.mjs';
import { newTemporaryFolder } from '../../scripts/set-up/temporary.mjs';
import { Tally } from '../../scripts/testing/tally.mjs';
import { linesOf } from '../../scripts/testing/vitest.mjs';

const execute = promisify(execFile);
let folder = '';
beforeAll(async () => {
  folder = await newTemporaryFolder('tagwire-set-up-');
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const inside = (name: string) => {
  const path = join(folder, name);
  mkdirSync(path, { mode: 0o755 });
  return path;
};

describe('the cluster of its own', () => {
  test('keeps its data over a restart, listens on loopback alone and keeps its passwords private', async () => {
    const home = inside('plain');
    const { database } = await rememberedPorts(join(home, 'ports.json'), ['database']);
    const first = await startCluster({ home, port: database });
    expect([first.fresh, first.elsewhere]).toEqual([true, undefined]);
    const owner = await connect(first.ownerUrl);
    await owner.query('create table public.kept (n integer)');
    await owner.query('insert into public.kept values (7)');
    await owner.end();
    const superuser = await connect(first.superuserUrl);
    const shown = await superuser.query(
      "select current_setting('listen_addresses') as addresses, current_setting('unix_socket_directories') as sockets, current_setting('fsync') as fsync, current_setting('synchronous_commit') as committed",
    );
    await superuser.end();
    expect(shown.rows).toEqual([
      { addresses: '127.0.0.1', sockets: '', fsync: 'on', committed: 'on' },
    ]);
    await first.stop();

    const second = await startCluster({ home, port: database });
    const app = await connect(second.appUrl);
    await expect(app.query('select n from public.kept')).rejects.toThrow('permission denied');
    await expect(app.query('create table public.mine (n integer)')).rejects.toThrow(
      'permission denied',
    );
    await app.end();
    const again = await connect(second.ownerUrl);
    expect((await again.query('select n from public.kept')).rows).toEqual([{ n: 7 }]);
    await again.end();
    const wrong = second.ownerUrl.replace(/:[0-9a-f]+@/, ':wrong@');
    await expect(connect(wrong)).rejects.toThrow('password authentication failed');

    // A start that was killed leaves the server running; the next one takes it over.
    const third = await startCluster({ home, port: database + 1 });
    expect(third.ownerUrl).toBe(second.ownerUrl);
    await third.stop();
    expect(existsSync(join(third.folder, 'postmaster.pid'))).toBe(false);

    expect(statSync(join(home, 'database.json')).mode & 0o777).toBe(0o600);
    expect(statSync(third.folder).mode & 0o777).toBe(0o700);
    expect(statSync(third.folder).uid).toBe(serverAccount().uid);
  });

  test.runIf(process.getuid?.() === 0)(
    'goes outside a checkout whose parent is closed to the database’s account',
    async () => {
      const closed = inside('closed');
      const home = join(closed, 'storage');
      mkdirSync(home);
      chmodSync(closed, 0o700);
      const { database } = await rememberedPorts(join(home, 'ports.json'), ['database']);
      const cluster = await startCluster({ home, port: database });
      expect(cluster.elsewhere).toMatch(/^\/var\/tmp\/tagwire-[0-9a-f]{16}$/);
      expect(statSync(cluster.elsewhere ?? '').mode & 0o777).toBe(0o700);
      await cluster.stop();
      const again = await startCluster({ home, port: database });
      expect([again.fresh, again.folder]).toEqual([false, cluster.folder]);
      await again.stop();
      rmSync(cluster.elsewhere ?? '', { recursive: true });
    },
  );

  test('does not take a data folder whose passwords are lost', async () => {
    const home = inside('lost');
    mkdirSync(join(home, 'postgres'), { mode: 0o700 });
    serverAccount().own(join(home, 'postgres'));
    writeFileSync(join(home, 'postgres/PG_VERSION'), '15\n');
    await expect(startCluster({ home, port: 1 })).rejects.toThrow('database.json is missing');
  });
});

describe('ports', () => {
  test('are chosen once and kept, and a taken one is named with a way out', async () => {
    const file = join(inside('ports'), 'ports.json');
    const first = await rememberedPorts(file, ['site', 'database']);
    const second = await rememberedPorts(file, ['site', 'database', 'mailbox']);
    expect(second).toMatchObject(first);
    expect(new Set(Object.values(second)).size).toBe(3);

    const squatter = createServer().listen(first.site, '127.0.0.1');
    await new Promise((resolve) => squatter.once('listening', resolve));
    const refused = demandFree(first.site, 'the site', 'Set PORT.');
    await expect(refused).rejects.toThrow(
      `Port ${first.site}, wanted for the site, is taken by another program.`,
    );
    squatter.close();
  });
});

describe('the lock', () => {
  test('says where Tagwire runs, and is taken over from a process that is gone', () => {
    const file = join(inside('lock'), 'running.json');
    const held = takeLock(file, 'http://127.0.0.1:21000');
    expect(() => takeLock(file, 'http://127.0.0.1:21001')).toThrow(
      `already runs from this folder, at http://127.0.0.1:21000 (process ${process.pid}`,
    );
    held.release();
    expect(existsSync(file)).toBe(false);

    // The number is in use again, by a process that began at another time.
    const stale = { pid: process.pid, begun: '1', since: '', url: 'http://127.0.0.1:21002' };
    expect(beginningOf(process.pid)).not.toBe('1');
    writeFileSync(file, JSON.stringify(stale));
    takeLock(file, 'http://127.0.0.1:21003').release();
  });
});

describe('configuration', () => {
  test('a stand-in starts only where its own variables are unset', () => {
    expect(wantedStandIns({})).toEqual({
      database: true,
      objects: true,
      mail: true,
      identity: true,
    });
    expect(wantedStandIns({ DATABASE_URL: 'postgresql://elsewhere/x', S3_BUCKET: 'b' })).toEqual({
      database: false,
      objects: false,
      mail: true,
      identity: true,
    });
    expect(wantedStandIns({ SMTP_URL: 'smtp://x', OIDC_ISSUER: 'https://x' })).toEqual({
      database: true,
      objects: true,
      mail: false,
      identity: false,
    });
  });

  test('a test run begins without any variable of the product, and .env.example documents each', () => {
    const set = Object.fromEntries(variables.map((name) => [name, 'x']));
    expect(withoutConfiguration({ ...set, PATH: '/bin' })).toEqual({ PATH: '/bin' });
    const example = readFileSync(join(root, '.env.example'), 'utf8');
    const documented = [...example.matchAll(/^# ?([A-Z][A-Z0-9_]+)=/gm)].map(([, name]) => name);
    expect(documented.toSorted()).toEqual(expect.arrayContaining(variables.toSorted()));
    const read = readFileSync(join(root, 'src/config.ts'), 'utf8');
    const known = [...read.matchAll(/^ {2}([A-Z][A-Z0-9_]+):/gm)].map(([, name]) => name);
    expect(known.length).toBeGreaterThan(10);
    expect(variables).toEqual(expect.arrayContaining(known));
  });

  test('the ledger’s key is made once, for its owner alone', () => {
    const home = inside('key');
    const file = ensureLedgerKey(home);
    const made = readFileSync(file, 'utf8');
    expect(made).toContain('BEGIN PRIVATE KEY');
    expect(statSync(file).mode & 0o777).toBe(0o600);
    ensureLedgerKey(home);
    expect(readFileSync(file, 'utf8')).toBe(made);
  });
});

describe('packages and build', () => {
  test('a package that is missing or in another version is noticed', () => {
    const place = inside('packages');
    const lock = (version: string) =>
      JSON.stringify({
        packages: {
          '': {},
          'node_modules/a': { version },
          'node_modules/for-another-system': { version: '1.0.0', optional: true },
        },
      });
    expect(isInstalled(place, lock('1.0.0'))).toBe(false);
    mkdirSync(join(place, 'node_modules/a'), { recursive: true });
    writeFileSync(join(place, 'node_modules/a/package.json'), '{"version":"1.0.0"}');
    expect(isInstalled(place, lock('1.0.0'))).toBe(true);
    expect(isInstalled(place, lock('1.0.1'))).toBe(false);
  });

  test('the build is another when a source, its name, or the public address is', () => {
    const place = inside('build');
    mkdirSync(join(place, 'src'));
    const hash = (url = 'http://a') => hashOfSources(place, url);
    writeFileSync(join(place, 'src/a.ts'), '1');
    const first = hash();
    expect(hash()).toBe(first);
    expect(hash('http://b')).not.toBe(first);
    writeFileSync(join(place, 'src/a.ts'), '2');
    const second = hash();
    writeFileSync(join(place, 'src/b.ts'), '');
    expect(new Set([first, second, hash()]).size).toBe(3);
  });
});

describe('what is said', () => {
  test('a full disk and a closed folder are named with a way out', () => {
    const full = Object.assign(new Error('write'), { code: 'ENOSPC' });
    expect(explain(full).message).toContain('The disk is full');
    const closed = Object.assign(new Error('open'), { code: 'EACCES' });
    expect(explain(closed).mend).toContain('account that owns');
    expect(explain(new Problem('this', 'that'))).toEqual({ message: 'this', mend: 'that' });
    expect(explain(new Error('odd')).trace).toContain('odd');
  });

  test('every part is stopped, in the opposite order, even when one cannot be', async () => {
    const stack = newStack();
    const seen: string[] = [];
    stack.push(async () => void seen.push('first'));
    stack.push(() => Promise.reject(new Error('stuck')));
    stack.push(async () => void seen.push('last'));
    await expect(stack.stopAll()).rejects.toThrow('stuck');
    expect(seen).toEqual(['last', 'first']);
  });

  test('a broken test file and a project without tests count as failures', () => {
    const files = [
      {
        name: 'tests/domain/a.test.ts',
        status: 'passed' as const,
        assertionResults: [{ status: 'passed' }, { status: 'passed' }],
      },
      {
        name: 'tests/domain/b.test.ts',
        status: 'failed' as const,
        message: 'no such file\n\n at x\n at y',
        assertionResults: [],
      },
      {
        name: 'tests/api/c.test.ts',
        status: 'failed' as const,
        assertionResults: [
          {
            status: 'failed',
            fullName: 'asks twice',
            failureMessages: ['\u001b[31mtimed out'],
          },
          { status: 'passed' },
        ],
      },
    ];
    const lines = linesOf(['domain', 'api', 'browser'], files, false);
    expect(lines).toEqual([
      {
        name: 'domain',
        passed: 2,
        failed: 1,
        failures: ['  tests/domain/b.test.ts\n      no such file\n      at x\n      at y'],
      },
      {
        name: 'api',
        passed: 1,
        failed: 1,
        failures: ['  tests/api/c.test.ts > asks twice\n      timed out'],
      },
      { name: 'browser', passed: 0, failed: 1, failures: [] },
    ]);
    const tally = new Tally();
    for (const line of lines) tally.add({ ...line, milliseconds: 0 });
    expect(tally.toString()).toMatch(
      /b\.test\.ts\n {6}no such file\n[\s\S]*asks twice\n {6}timed out\n\n3 passed, 3 failed$/,
    );
    expect(linesOf(['browser'], files, true)).toEqual([{ name: 'browser', passed: 0, failed: 0 }]);
  });
});

describe('the commands', () => {
  const node = (script: string, env: NodeJS.ProcessEnv) =>
    execute(process.execPath, [resolve(root, 'scripts', script)], {
      env: { PATH: process.env['PATH'] ?? '', ...env },
    }).then(
      ({ stdout, stderr }) => ({ code: 0, said: stdout + stderr }),
      (error: { code: number; stdout: string; stderr: string }) => ({
        code: error.code,
        said: error.stdout + error.stderr,
      }),
    );

  test('a start while one runs says where and changes nothing', async () => {
    const home = inside('running');
    const held = takeLock(join(home, 'running.json'), 'http://127.0.0.1:21010');
    const { code, said } = await node('start.mjs', { STORAGE_DIR: home });
    held.release();
    expect(code).toBe(1);
    expect(said).toContain('already runs from this folder, at http://127.0.0.1:21010');
    expect(existsSync(join(home, 'postgres'))).toBe(false);
  });

  test('a taken port stops the start and names itself and the way out', async () => {
    const home = inside('taken');
    const squatter = createServer().listen(0, '127.0.0.1');
    await new Promise((resolve) => squatter.once('listening', resolve));
    const address = squatter.address();
    const port = typeof address === 'object' ? address?.port : undefined;
    const { code, said } = await node('start.mjs', { STORAGE_DIR: home, PORT: String(port) });
    squatter.close();
    expect(code).toBe(1);
    expect(said).toContain(`Port ${port}, wanted for the site, is taken by another program.`);
    expect(said).toContain('set PORT to another one');
    expect(existsSync(join(home, 'running.json'))).toBe(false);
    expect(existsSync(join(home, 'postgres'))).toBe(false);
  });

  test('another Node is refused by name before anything is imported', async () => {
    for (const script of ['start.mjs', 'test.mjs']) {
      const text = readFileSync(join(root, 'scripts', script), 'utf8');
      expect(text).not.toMatch(/^import /m);
      const place = inside(`node-${script}`);
      const claimed = join(place, script);
      writeFileSync(
        claimed,
        text
          .replace('process.versions.node', "'18.20.4'")
          .replaceAll('process.version', "'v18.20.4'"),
      );
      const { code, said } = await node(claimed, {});
      expect(code).toBe(1);
      expect(said).toContain('Tagwire needs Node.js 20.19');
    }
  });

  test('migrate without the owner’s address says what it is', async () => {
    const { code, said } = await node('migrate.mjs', {});
    expect(code).toBe(1);
    expect(said).toContain('MIGRATION_DATABASE_URL is not set');
  });
});
