import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Served } from '../../../server/serve.ts';
import { password } from '../access/people.ts';
import { SignedIn } from '../access/signed-in.ts';
import { leakPlant } from '../plants.ts';
import { dataDirectory, servedOn } from '../serving.ts';
import { vouchline } from './run-vouchline.ts';

let data: ReturnType<typeof dataDirectory>;
let served: Served;
const start = (): Promise<Served> => servedOn(data.path, { kind: 'records' }, { access: 'accounts' });
beforeEach(async () => {
  data = dataDirectory(leakPlant);
  served = await start();
});
afterEach(async () => {
  await served.stop('the test is over');
  data.remove();
});

describe('vouchline account', () => {
  it('makes a link for a new password while the server is stopped, and that is on record', async () => {
    await SignedIn.byLink(served, served.firstLink!, 'olaf');
    expect(await vouchline(['account', 'link', 'olaf', '--data', data.path])).toMatchObject({ code: 3, err: expect.stringContaining('in use') as string });
    await served.stop('lost password');
    const listed = JSON.parse((await vouchline(['account', 'list', '--json', '--data', data.path])).out) as object[];
    expect(listed).toMatchObject([{ name: 'olaf', shownAs: 'olaf Holm', disabled: false, grants: [{ role: 'administrator' }, { role: 'engineer' }] }]);
    expect(await vouchline(['account', 'link', 'nobody', '--data', data.path])).toMatchObject({ code: 2, err: expect.stringContaining('expected one of olaf') as string });
    const said = await vouchline(['account', 'link', 'Olaf', '--data', data.path]);
    const code = /#(\S+)/.exec(said.out)![1];
    served = await start();
    const again = await fetch(`${served.address}/api/invitations/accept`, { method: 'POST', headers: { 'content-type': 'application/json', origin: served.address }, body: JSON.stringify({ code, password: `${password} again` }) });
    const cookie = again.headers.get('set-cookie')!.split(';')[0]!;
    expect(await (await fetch(`${served.address}/api/changes?kind=invitation&holds=olaf`, { headers: { cookie } })).json()).toMatchObject([{ who: 'command line', why: 'asked for on the command line' }]);
  });

  it('says what comes next where there is no account', async () => {
    await served.stop('nothing yet');
    expect((await vouchline(['account', 'list', '--data', data.path])).out).toContain('prints a link for the first one');
  });
});
