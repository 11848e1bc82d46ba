import { asc, eq } from 'drizzle-orm';
import { URI } from 'otpauth';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { SecretSeal, stepOfCode } from '../../server/src/platform/auth/one-time-secret';
import { audit, oneTimeSecrets, people, recoveryCodes } from '../../server/src/platform/db/schema';
import { addInes, codeAt, NotingHasher, PASSWORD, signIn, turnCodesOn } from './account-people';
import { TestServer, type Client } from './test-server';

const HALF_MINUTE = 30_000;

let server: TestServer;
let ines: Client;
beforeEach(() => {
  server = new TestServer({ hasher: new NotingHasher(), config: { trustProxy: 1 } });
  ines = addInes(server);
});
afterEach(() => {
  server.close();
});

const actions = () =>
  server.db
    .select()
    .from(audit)
    .where(eq(audit.subject, 'ines'))
    .orderBy(asc(audit.seq))
    .all()
    .map(({ action, details }) => [action, (details as { why?: string }).why].filter(Boolean).join(' '));

describe('a one-time code', () => {
  // RFC 6238, appendix B, the rows for SHA-1 (eight digits there; six are the last of them). Secret "12345678901234567890".
  const SECRET = 'GEZDGNBVGY3TQOJQGEZDGNBVGY3TQOJQ';
  it.each([
    [59, '287082'],
    [1_111_111_109, '081804'],
    [1_111_111_111, '050471'],
    [1_234_567_890, '005924'],
    [2_000_000_000, '279037'],
    [20_000_000_000, '353130'],
  ])('at second %i is %s, and counts half a minute either way', (second, code) => {
    const step = Math.floor(second / 30);
    const at = (offset: number) => new Date((second + offset) * 1000);
    expect(stepOfCode(SECRET, code, at(0))).toBe(step);
    expect(stepOfCode(SECRET, code, at(30))).toBe(step);
    expect(stepOfCode(SECRET, code, at(-30))).toBe(step);
    expect(stepOfCode(SECRET, code, at(60))).toBeUndefined();
    expect(stepOfCode(SECRET, code, at(-60))).toBeUndefined();
  });

  it.each(['', '28708', '2870822', 'abcdef', '-87082', '２８７０８２'])('is never %j', (typed) => {
    expect(stepOfCode(SECRET, typed, new Date(59_000))).toBeUndefined();
  });
});

describe('turning codes on', () => {
  it('asks for the password, and counts only once a code has confirmed it', async () => {
    await ines.post('/api/one-time-codes', { password: 'not it' }).expect(422);
    const begun = await ines.post('/api/one-time-codes', { password: PASSWORD }).expect(201);
    const { secret, address } = begun.body as { secret: string; address: string };
    // 160 random bits, as RFC 4226 recommends (section 4, R6).
    expect(secret).toMatch(/^[A-Z2-7]{32}$/);
    expect(URI.parse(address)).toMatchObject({ issuer: 'Riseback', label: 'ines@ternquay.example' });
    await signIn(server, {}).expect(200);
    await ines.post('/api/one-time-codes/confirmation', { code: '000000' }).expect(422);
    expect((await ines.get('/api/one-time-codes').expect(200)).body).toEqual({ on: false, recoveryCodesLeft: 0 });
    await signIn(server, {}).expect(200);

    const code = codeAt(secret, server.now());
    const confirmed = await ines.post('/api/one-time-codes/confirmation', { code }).expect(200);
    const codes = (confirmed.body as { recoveryCodes: string[] }).recoveryCodes;
    expect(new Set(codes).size).toBe(10);
    for (const one of codes) expect(one).toMatch(/^([a-z2-7]{4}-){5}[a-z2-7]{4}$/);
    expect((await ines.get('/api/one-time-codes').expect(200)).body).toEqual({
      on: true,
      since: server.now().toISOString(),
      recoveryCodesLeft: 10,
    });
    expect((await signIn(server, {}).expect(401)).body).toMatchObject({ type: '/problems/code-needed' });
    // The code that confirmed is spent.
    await signIn(server, { code }).expect(401);
    expect(actions()).toContain('codes.on');
  });

  it('a second time is refused, so that nobody can slip another secret in', async () => {
    const { secret } = await turnCodesOn(server, ines);
    await ines.post('/api/one-time-codes', { password: PASSWORD }).expect(409);
    const code = codeAt(secret, server.now());
    await ines.post('/api/one-time-codes/confirmation', { code }).expect(409);
  });

  it('keeps the secret sealed to the person and the recovery codes as hashes', async () => {
    const { secret, recoveryCodes: codes } = await turnCodesOn(server, ines);
    const row = server.db.select().from(oneTimeSecrets).get();
    const stored = JSON.stringify([row, server.db.select().from(recoveryCodes).all()]);
    for (const plain of [secret, ...codes, ...codes.map((code) => code.replaceAll('-', ''))])
      expect(stored).not.toContain(plain);
    const seal = new SecretSeal(server.config.sessionSecret);
    const sealed = row?.sealedSecret ?? '';
    expect(seal.open(sealed, 'ines')).toBe(secret);
    expect(seal.open(sealed, 'tomas')).toBeUndefined();
    expect(new SecretSeal(`${server.config.sessionSecret}x`).open(sealed, 'ines')).toBeUndefined();
    expect(seal.open(`${sealed.slice(0, -2)}AA`, 'ines')).toBeUndefined();
    expect(seal.open('', 'ines')).toBeUndefined();
  });
});

describe('signing in with codes on', () => {
  let secret = '';
  let recovery: readonly string[] = [];
  beforeEach(async () => {
    ({ secret, recoveryCodes: recovery } = await turnCodesOn(server, ines));
  });
  const code = () => codeAt(secret, server.now());

  it('says nothing of codes before the password was right', async () => {
    const answers = [
      await signIn(server, { password: 'not it' }).expect(401),
      await signIn(server, { password: 'not it', code: code() }).expect(401),
      await signIn(server, { email: 'nobody@ternquay.example', code: code() }).expect(401),
    ];
    for (const { body } of answers) expect(body).toMatchObject({ type: '/problems/wrong-credentials' });
  });

  it('takes a code once, and none older than one that was taken', async () => {
    const older = codeAt(secret, new Date(server.now().getTime() - HALF_MINUTE));
    const present = code();
    const spaced = `${present.slice(0, 3)} ${present.slice(3)}`;
    await signIn(server, { code: spaced }).expect(200);
    for (const spent of [present, older]) {
      const refused = await signIn(server, { code: spent }).expect(401);
      expect(refused.body).toMatchObject({ type: '/problems/wrong-code' });
    }
    server.pass(HALF_MINUTE);
    await signIn(server, { code: code() }).expect(200);
    expect(actions().filter((action) => action === 'session.refuse wrongCode')).toHaveLength(2);
  });

  it('takes the same code once even when it comes from two places at the same time', async () => {
    const same = { code: code() };
    const answers = await Promise.all(['192.0.2.1', '192.0.2.2'].map((address) => signIn(server, same, address)));
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 401]);
  });

  it('takes a recovery code once, however it was typed', async () => {
    const [first = '', second = ''] = recovery;
    await signIn(server, { code: first.toUpperCase().replaceAll('-', ' ') }).expect(200);
    await signIn(server, { code: first }).expect(401);
    expect((await ines.get('/api/one-time-codes')).body).toMatchObject({ recoveryCodesLeft: 9 });
    await signIn(server, { code: second }).expect(200);
    expect(actions().filter((action) => action === 'codes.recoveryUse')).toHaveLength(2);
  });

  it('slows the guessing of codes down, and a right password in between forgives none', async () => {
    for (let i = 0; i < 5; i += 1) {
      await signIn(server, {}).expect(401);
      await signIn(server, { code: '000000' }).expect(401);
    }
    await signIn(server, { code: code() }).expect(429);
  });

  it('counts wrong codes from all addresses together, and leaves recovery codes open', async () => {
    for (let i = 0; i < 20; i += 1) await signIn(server, { code: '000000' }, `192.0.2.${String(i)}`).expect(401);
    for (let i = 30; i < 35; i += 1) {
      const held = await signIn(server, { code: code() }, `192.0.2.${String(i)}`).expect(429);
      expect(Number(held.headers['retry-after'])).toBeGreaterThan(0);
    }
    expect(actions().filter((action) => action === 'session.refuse tooManyAttempts')).toHaveLength(1);
    await signIn(server, { code: recovery[0] }, '192.0.2.40').expect(200);
    server.pass(3_000);
    await signIn(server, { code: code() }, '192.0.2.41').expect(200);
  });

  it('is not possible for a disabled person, whose code is not spent', async () => {
    server.db.update(people).set({ disabledAt: server.now().toISOString() }).where(eq(people.id, 'ines')).run();
    const refused = await signIn(server, { code: recovery[0] }).expect(401);
    expect(refused.body).toMatchObject({ type: '/problems/wrong-credentials' });
    expect(actions()).not.toContain('codes.recoveryUse');
  });
});

describe('with codes on, one', () => {
  let secret = '';
  let recovery: readonly string[] = [];
  beforeEach(async () => {
    ({ secret, recoveryCodes: recovery } = await turnCodesOn(server, ines));
  });
  const proof = () => ({ password: PASSWORD, code: codeAt(secret, server.now()) });

  it.each(['/api/one-time-codes/removal', '/api/recovery-codes'])(
    'needs the password and a code for %s',
    async (path) => {
      const wrongPassword = await ines.post(path, { ...proof(), password: 'not it' }).expect(422);
      expect(wrongPassword.body).toMatchObject({ errors: [{ pointer: '/password' }] });
      const wrongCode = await ines.post(path, { ...proof(), code: '000000' }).expect(422);
      expect(wrongCode.body).toMatchObject({ errors: [{ pointer: '/code' }] });
      await ines.post(path, { password: PASSWORD }).expect(400);
      expect((await ines.get('/api/one-time-codes')).body).toMatchObject({ on: true, recoveryCodesLeft: 10 });
      expect(actions()).toContain('person.refuse wrongCode');
    },
  );

  it('makes new recovery codes, and the old ones are worth nothing', async () => {
    const answer = await ines.post('/api/recovery-codes', proof()).expect(200);
    const [fresh = ''] = (answer.body as { recoveryCodes: string[] }).recoveryCodes;
    await signIn(server, { code: recovery[0] }).expect(401);
    await signIn(server, { code: fresh }).expect(200);
    expect(actions()).toContain('codes.recoveryRenew');
  });

  it('turns them off, also by a recovery code, and may turn them on again with another secret', async () => {
    await ines.post('/api/one-time-codes/removal', { password: PASSWORD, code: recovery[3] }).expect(204);
    await signIn(server, {}).expect(200);
    expect(server.db.select().from(recoveryCodes).all()).toEqual([]);
    expect(actions()).toContain('codes.off');
    const again = await turnCodesOn(server, ines);
    expect(again.secret).not.toBe(secret);
    await ines.post('/api/one-time-codes/removal', { password: PASSWORD, code: recovery[4] }).expect(422);
  });

  it('who are off cannot be asked for a code', async () => {
    await ines.post('/api/one-time-codes/removal', { password: PASSWORD, code: recovery[0] }).expect(204);
    await ines.post('/api/recovery-codes', { password: PASSWORD, code: '000000' }).expect(409);
  });
});
