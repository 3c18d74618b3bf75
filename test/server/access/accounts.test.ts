import { beforeEach, describe, expect, it } from 'vitest';
import { AccessBook } from '../../../server/access/access-book.ts';
import { networkOf } from '../../../server/access/network-of.ts';
import { Passwords } from '../../../server/access/passwords.ts';
import { SignIn } from '../../../server/access/sign-in.ts';
import { memoryDisk } from '../../../server/store/memory-store.ts';
import { password, Plant, type Person } from './people.ts';

let plant: Plant;
let olaf: Person;
beforeEach(async () => {
  plant = await new Plant().open();
  olaf = await plant.administrator();
});

const viewer = [{ role: 'viewer', line: null }];
const idOf = async (name: string): Promise<string> => ((await olaf.ask('GET', '/api/accounts')).body as unknown as { id: string; name: string }[]).find((one) => one.name === name)!.id;

describe('the first account', () => {
  it('is made by a link that holds once and for a day', async () => {
    const again = await plant.person().ask('POST', '/api/invitations/accept', { code: plant.access.firstCode, name: 'eve', shownAs: 'Eve', password });
    expect(again.status).toBe(404);
    const late = await new Plant().open();
    late.now += 86_400_000;
    expect((await late.person().ask('POST', '/api/invitations/look', { code: late.access.firstCode })).status).toBe(404);
    expect((await late.person().ask('GET', '/api/me')).body).toMatchObject({ access: 'accounts', firstAccount: true, caller: null });
  });

  it('is not offered once there is one, and a start before that withdraws the link of the start before', async () => {
    const disk = memoryDisk();
    const first = await new Plant(disk).open();
    disk.inUse = false;
    const second = await new Plant(disk).open();
    expect((await second.person().ask('POST', '/api/invitations/look', { code: first.access.firstCode })).status).toBe(404);
    await second.administrator();
    disk.inUse = false;
    expect((await new Plant(disk).open()).access.firstCode).toBeUndefined();
  });
});

describe('an invitation', () => {
  it('gives its roles and nothing else, and tells what it is for', async () => {
    const { body } = await olaf.ask('POST', '/api/invitations', { grants: [{ role: 'supervisor', line: 'A' }], shownAs: 'Ines Maurer' });
    const code = (body['link'] as string).split('#')[1]!;
    const ines = plant.person();
    expect((await ines.ask('POST', '/api/invitations/look', { code })).body).toMatchObject({ kind: 'account', shownAs: 'Ines Maurer', grants: [{ role: 'supervisor', line: 'A' }] });
    expect((await ines.ask('POST', '/api/invitations/accept', { code, name: 'ines', shownAs: 'Ines Maurer', password, grants: [] })).status).toBe(400);
    expect((await ines.ask('POST', '/api/invitations/accept', { code, name: 'OLAF', shownAs: 'Ines Maurer', password })).status).toBe(409);
    expect((await ines.ask('POST', '/api/invitations/accept', { code, name: 'ines', shownAs: 'Ines Maurer', password: 'ines maurer' })).status).toBe(400);
    expect((await ines.ask('POST', '/api/invitations/accept', { code, name: 'ines', shownAs: 'Ines Maurer', password: 'Ines Maurer, Hose works' })).body['field']).toBe('password');
    expect((await ines.ask('POST', '/api/invitations/accept', { code, name: 'ines', shownAs: 'Ines Maurer', password })).status).toBe(200);
    const me = (await ines.ask('GET', '/api/me')).body['caller'] as { may: Record<string, unknown> };
    expect(me).toMatchObject({ kind: 'account', name: 'Ines Maurer', grants: [{ role: 'supervisor', line: 'A' }] });
    expect(me.may).toMatchObject({ acknowledge: { plant: false, lines: ['A'] }, 'restart-evidence': { lines: [] }, 'manage-accounts': { plant: false } });
    expect((await ines.ask('GET', '/api/accounts')).status).toBe(403);
  });

  it('can be withdrawn, and runs out', async () => {
    const { body } = await olaf.ask('POST', '/api/invitations', { grants: viewer, days: 2 });
    const code = (body['link'] as string).split('#')[1];
    const look = async (): Promise<number> => (await plant.person().ask('POST', '/api/invitations/look', { code })).status;
    plant.now += 2 * 86_400_000 - 1;
    expect(await look()).toBe(200);
    expect((await olaf.ask('GET', '/api/invitations')).status).toBe(401); // His session has run out, too.
    await olaf.signIn('olaf');
    expect((await olaf.ask('DELETE', `/api/invitations/${String(body['id'])}`)).status).toBe(204);
    expect(await look()).toBe(404);
  });
});

describe('a session', () => {
  it('has a new secret at every sign-in, whatever cookie came with it', async () => {
    const planted = plant.person();
    planted.cookie = 'vouchline-session=vs_planted';
    await planted.signIn('olaf');
    expect(planted.cookie).not.toContain('planted');
    const stranger = plant.person();
    stranger.cookie = 'vouchline-session=vs_planted';
    expect((await stranger.ask('GET', '/api/accounts')).status).toBe(401);
  });

  it('ends when it is not used, and in any case after its days', async () => {
    plant.now += 11 * 3_600_000;
    expect((await olaf.ask('GET', '/api/accounts')).status).toBe(200);
    await new Promise((resolve) => setImmediate(resolve));
    plant.now += 11 * 3_600_000;
    expect((await olaf.ask('GET', '/api/accounts')).status).toBe(200);
    plant.now += 12 * 3_600_000 + 1;
    expect((await olaf.ask('GET', '/api/accounts')).status).toBe(401);
    await olaf.signIn('olaf');
    for (let hours = 0; hours < 30 * 24; hours += 10) {
      await olaf.ask('GET', '/api/me');
      await new Promise((resolve) => setImmediate(resolve));
      plant.now += 10 * 3_600_000;
    }
    expect((await olaf.ask('GET', '/api/accounts')).status).toBe(401);
  });

  it('is over at once and for good when signed out, ended elsewhere, or its account disabled', async () => {
    const ended: string[] = [];
    plant.access.onEnded((by) => ended.push(by));
    const mette = await plant.account(olaf, 'mette', viewer);
    const other = plant.person();
    await other.signIn('mette');
    const replayed = plant.person();
    replayed.cookie = other.cookie;
    const sessions = (await mette.ask('GET', '/api/own/sessions')).body as unknown as { id: string; current: boolean }[];
    const elsewhere = sessions.find(({ current }) => !current)!.id;
    expect((await mette.ask('DELETE', `/api/own/sessions/${elsewhere}`)).status).toBe(204);
    expect([(await replayed.ask('GET', '/api/own/sessions')).status, ended]).toEqual([401, [elsewhere]]);
    const cookie = mette.cookie;
    await mette.ask('POST', '/api/sign-out');
    mette.cookie = cookie;
    expect((await mette.ask('GET', '/api/own/sessions')).status).toBe(401);
    await mette.signIn('mette');
    await olaf.ask('PUT', `/api/accounts/${await idOf('mette')}`, { disabled: true, why: 'left' });
    expect([(await mette.ask('GET', '/api/own/sessions')).status, (await plant.person().signIn('mette')).status]).toEqual([401, 401]);
  });

  it('ends everywhere else when the password changes', async () => {
    const mette = await plant.account(olaf, 'mette', viewer);
    const phone = plant.person();
    await phone.signIn('mette');
    expect((await mette.ask('POST', '/api/own/password', { old: 'wrong', new: 'another long one, with rain' })).body['field']).toBe('old');
    expect((await mette.ask('POST', '/api/own/password', { old: password, new: 'another long one, with rain' })).status).toBe(204);
    expect([(await mette.ask('GET', '/api/own/sessions')).status, (await phone.ask('GET', '/api/own/sessions')).status]).toEqual([200, 401]);
    expect([(await phone.signIn('mette')).status, (await phone.ask('POST', '/api/sign-in', { name: 'mette', password: 'another long one, with rain' })).status]).toEqual([401, 200]);
  });

  it('goes on after a restart of the server', async () => {
    const disk = memoryDisk();
    const before = await new Plant(disk).open();
    const person = await before.administrator();
    disk.inUse = false;
    const after = await new Plant(disk).open();
    const same = after.person();
    same.cookie = person.cookie;
    expect((await same.ask('GET', '/api/accounts')).status).toBe(200);
    expect(JSON.stringify([...disk.access.items.values()])).not.toContain(person.cookie!.split('=')[1]);
  });
});

describe('guessing', () => {
  it('is slowed down more and more for one account from one address, and never for good', async () => {
    const eve = plant.person('10.0.0.66');
    for (let tries = 0; tries < 5; tries += 1) expect((await eve.signIn('olaf', 'guess')).status).toBe(401);
    expect((await eve.signIn('olaf', 'guess')).status).toBe(401);
    const slowed = await eve.signIn('olaf', 'guess');
    expect([slowed.status, slowed.retryAfter]).toEqual([429, '5']);
    plant.now += 5_000;
    expect((await eve.signIn('olaf', 'guess')).status).toBe(401);
    expect((await eve.signIn('olaf')).retryAfter).toBe('10');
    expect((await plant.person('10.0.0.8').signIn('olaf')).status).toBe(200);
    for (let tries = 0; tries < 20; tries += 1) {
      await eve.signIn('olaf', 'guess');
      plant.now += 15 * 60_000;
    }
    expect((await eve.signIn('olaf')).status).toBe(200);
  });

  it('costs the same for a name nobody has, and says the same', async () => {
    const known = await plant.person().ask('POST', '/api/sign-in', { name: 'olaf', password: 'guess' });
    const unknown = await plant.person('10.0.0.9').ask('POST', '/api/sign-in', { name: 'nobody', password: 'guess' });
    expect(unknown).toEqual(known);
  });

  it('hashes once for either', async () => {
    const passwords = new Passwords();
    const signIn = new SignIn(await AccessBook.load(plant.file, () => plant.now), passwords);
    const hashed = async (name: string): Promise<number> => {
      const before = passwords.hashings;
      await expect(signIn.check(name, 'guess', { address: '10.0.0.1', agent: '' })).rejects.toThrow('not right');
      return passwords.hashings - before;
    };
    expect([await hashed('olaf'), await hashed('nobody'), await hashed('olaf')]).toEqual([1, 1, 1]);
  });

  it('many at the same time is no way around, nor are spaces and capitals', async () => {
    const eve = plant.person('10.0.0.66');
    const all = await Promise.all(Array.from({ length: 30 }, (_, k) => eve.signIn([' olaf', 'OLAF', 'olaf  '][k % 3]!, `guess ${k}`)));
    expect(all.filter(({ status }) => status === 401).length).toBe(6);
    expect(all.filter(({ status }) => status === 429).length).toBe(24);
  });

  it('from all over one network of addresses is guessing from one place', async () => {
    const tries = async (address: (k: number) => string): Promise<number[]> => {
      const statuses: number[] = [];
      for (let k = 0; k < 8; k += 1) statuses.push((await plant.person(address(k)).signIn('olaf', 'guess')).status);
      return statuses;
    };
    expect(await tries((k) => `2001:db8:1:2::${k + 1}`)).toEqual([401, 401, 401, 401, 401, 401, 429, 429]);
    expect(await tries((k) => `2001:db8:1:${k + 3}::1`)).toEqual(Array(8).fill(401));
  });

  it('of the present password at an open session is slowed down, too', async () => {
    const change = (old: string): Promise<{ status: number }> => olaf.ask('POST', '/api/own/password', { old, new: 'eight long hoses in the snow' });
    for (let tries = 0; tries < 6; tries += 1) expect((await change('guess')).status).toBe(400);
    expect([(await change(password)).status, (await olaf.ask('PUT', '/api/own/pin', { password, pin: '28464917' })).status]).toEqual([429, 429]);
    plant.now += 5_000;
    expect((await change(password)).status).toBe(204);
  });

  it('is on record, ten a minute at most', async () => {
    for (let from = 0; from < 30; from += 1) await plant.person(`10.0.1.${from}`).signIn('olaf', 'guess');
    expect((await plant.changes()).filter(({ kind }) => kind === 'sign-in-failed').length).toBe(10);
  });
});

describe('a network of addresses', () => {
  it.each([
    ['10.0.0.7', '10.0.0.7'], ['::ffff:10.0.0.7', '10.0.0.7'], ['::1', '0:0:0:0::/64'], ['2001:DB8:0:1::5', '2001:db8:0:1::/64'],
    ['2001:db8:0:1:ffff:ffff:ffff:ffff', '2001:db8:0:1::/64'], ['fe80::1%eth0', 'fe80:0:0:0::/64'], ['2001:db8::', '2001:db8:0:0::/64'], ['unknown', 'unknown'],
  ])('of %s is %s', (address, network) => {
    expect(networkOf(address)).toBe(network);
  });
});

describe('accounts', () => {
  it('of two people look different on record', async () => {
    await plant.account(olaf, 'mette', viewer);
    const made = async (name: string, shownAs: string): Promise<{ status: number; body: Record<string, unknown> }> => {
      const { body } = await olaf.ask('POST', '/api/invitations', { grants: viewer });
      return plant.person().ask('POST', '/api/invitations/accept', { code: (body['link'] as string).split('#')[1], name, shownAs, password });
    };
    for (const twin of ['Mette  Holm', 'METTE HOLM', 'mette\u00a0Holm']) expect([twin, (await made('other', twin)).status]).toEqual([twin, 409]);
    for (const twin of ['mette\u200b Holm', 'm\u0435tte Holm', 'mette\u202eHolm']) expect([twin, await made('other', twin)]).toMatchObject([twin, { status: 400, body: { field: 'shownAs' } }]);
    expect((await made('m\u0435tte', 'Other')).body['field']).toBe('name');
    expect((await made('METTE', 'Other')).status).toBe(409);
  });

  it('keep their last administrator', async () => {
    const id = await idOf('olaf');
    expect((await olaf.ask('PUT', `/api/accounts/${id}`, { grants: viewer, why: 'x' })).status).toBe(409);
    expect((await olaf.ask('PUT', `/api/accounts/${id}`, { disabled: true, why: 'x' })).status).toBe(409);
    await plant.account(olaf, 'mette', [{ role: 'administrator', line: null }]);
    expect((await olaf.ask('PUT', `/api/accounts/${id}`, { grants: viewer, why: 'hands over' })).status).toBe(200);
    expect((await olaf.ask('GET', '/api/accounts')).status).toBe(403);
  });

  it('are on record: what before, what after, who and why, and no secret', async () => {
    const mette = await plant.account(olaf, 'mette', viewer);
    await olaf.ask('PUT', `/api/accounts/${await idOf('mette')}`, { grants: [{ role: 'maintenance', line: 'B' }], why: 'new shift' });
    await mette.ask('PUT', '/api/own/pin', { password, pin: '28464917' });
    await mette.ask('GET', '/api/accounts');
    await mette.ask('GET', '/api/accounts');
    const changes = await plant.changes();
    expect(changes.find(({ why }) => why === 'new shift')).toMatchObject({ kind: 'account', who: 'Olaf Berg', what: 'account mette', before: { grants: viewer }, after: { grants: [{ role: 'maintenance', line: 'B' }] } });
    expect(changes.filter(({ kind }) => kind === 'refused')).toMatchObject([{ who: 'mette Holm', what: 'GET /api/accounts', after: { action: 'manage-accounts' } }]);
    const text = JSON.stringify(changes);
    for (const secret of [password, '28464917', '$argon2', mette.cookie!.split('=')[1]!]) expect(text).not.toContain(secret);
  });

  it('are asked for a why, and for roles there are', async () => {
    const id = await idOf('olaf');
    expect((await olaf.ask('PUT', `/api/accounts/${id}`, { disabled: false })).body['field']).toBe('why');
    expect((await olaf.ask('POST', '/api/invitations', { grants: [{ role: 'king', line: null }] })).status).toBe(400);
    expect((await olaf.ask('PUT', '/api/accounts/nobody', { disabled: true, why: 'x' })).status).toBe(404);
  });
});
