import { ConfigError, readConfig } from '@/server/config';

const production = {
  TRAYWARD_MODE: 'production', PUBLIC_URL: 'https://lend.example.org', DATABASE_URL: 'postgres://a', DATABASE_QUEUE_URL: 'postgres://b',
  ACCESS_TOKEN_SECRET: 'a'.repeat(40), STRIPE_SECRET_KEY: 'sk_live_something', STRIPE_WEBHOOK_SECRET: 'whsec_something',
  SMTP_URL: 'smtps://mail.example.org', MAIL_FROM: 'Trayward <desk@lend.example.org>', STORAGE_DIR: '/var/lib/trayward/files',
};

function faults(env: Record<string, string | undefined>): readonly string[] {
  try {
    readConfig(env);
    return [];
  } catch (error) {
    return error instanceof ConfigError ? error.faults : [String(error)];
  }
}

describe('the configuration', () => {
  it('is taken when complete, with Secure cookies behind HTTPS', () => {
    expect(readConfig(production)).toMatchObject({ mode: 'production', port: 8080, secureCookies: true, stripe: { apiBase: undefined } });
  });

  it('names every missing variable at once', () => {
    const missing = faults({}).join('\n');
    for (const name of ['PUBLIC_URL', 'DATABASE_URL', 'DATABASE_QUEUE_URL', 'ACCESS_TOKEN_SECRET', 'STRIPE_SECRET_KEY', 'STRIPE_WEBHOOK_SECRET', 'SMTP_URL', 'STORAGE_DIR']) {
      expect(missing).toContain(name);
    }
  });

  it('refuses the demo\'s secrets, short secrets and the payment fake in production', () => {
    expect(faults({ ...production, ACCESS_TOKEN_SECRET: `demo-${'a'.repeat(40)}` })).toEqual([expect.stringContaining('ACCESS_TOKEN_SECRET')]);
    expect(faults({ ...production, ACCESS_TOKEN_SECRET: 'short' })).toEqual([expect.stringContaining('at least 32')]);
    expect(faults({ ...production, STRIPE_SECRET_KEY: 'sk_test_demo_abc' })).toEqual([expect.stringContaining('STRIPE_SECRET_KEY')]);
    expect(faults({ ...production, STRIPE_API_BASE: 'http://127.0.0.1:8090' })).toEqual([expect.stringContaining('STRIPE_API_BASE')]);
  });

  it.each([
    [{ PORT: '80a' }, 'PORT'],
    [{ PORT: '70000' }, 'PORT'],
    [{ PUBLIC_URL: 'lend.example.org' }, 'PUBLIC_URL'],
    [{ PUBLIC_URL: 'https://lend.example.org/path' }, 'PUBLIC_URL'],
    [{ TRAYWARD_MODE: 'staging' }, 'TRAYWARD_MODE'],
    [{ LOG_LEVEL: 'loud' }, 'LOG_LEVEL'],
  ])('refuses %j, naming %s', (change, name) => {
    expect(faults({ ...production, ...change })).toEqual([expect.stringContaining(name)]);
  });
});
