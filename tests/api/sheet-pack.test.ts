import { beforeAll, describe, expect, test } from 'vitest';
import { newOffice, versionThatIs, type Office } from './office';
import { newPricedOffice, sharedVersion } from './priced-office';
import { ORIGIN, useEmptyDatabase, Visitor } from './site';

useEmptyDatabase();

let office: Office;
beforeAll(async () => {
  office = await newOffice();
});

/** Whoever picks up a sheet. */
const passerBy = new Visitor();
const current = (id: string) => passerBy.get(`/api/current/${id}`);

describe('the page that a sheet’s QR code leads to', () => {
  test('says current, superseded by which version and when, or not issued, to whoever asks', async () => {
    const shared = await versionThatIs(office, 'shared');
    expect((await current(shared)).body).toEqual({ status: 'not-issued' });
    const first = await versionThatIs(office, 'issued');
    expect((await current(first)).body).toEqual({ status: 'current' });
    const before = Date.now();
    const second = await versionThatIs(office, 'issued');
    const { number } = (await office.owner.visitor.get(`/api/versions/${second}`)).body;
    const superseded = (await current(first)).body;
    expect(superseded).toEqual({ status: 'superseded', by: number, at: expect.any(String) });
    expect(Date.parse(superseded.at)).toBeGreaterThanOrEqual(before - 1000);
    expect((await current(second)).body).toEqual({ status: 'current' });
    // The first stays superseded by the one that took its place.
    await versionThatIs(office, 'issued');
    expect((await current(first)).body).toEqual(superseded);
  });

  test('answers ids that are nobody’s as it answers one that was not issued', async () => {
    const saved = await versionThatIs(office, 'saved');
    const answers = await Promise.all(
      [saved, 'nowhere', 'abcdefghijkmnpqrstuvwxyz', office.layoutId, "' or 1=1 --"].map((id) =>
        current(encodeURIComponent(id)),
      ),
    );
    for (const answer of answers) {
      expect(answer.status).toBe(200);
      expect(answer.body).toEqual({ status: 'not-issued' });
      expect([...answer.headers.keys()].sort()).toEqual([...answers[0].headers.keys()].sort());
    }
  });

  test('tells nothing of firm, project, floor or people', async () => {
    const issued = await versionThatIs(office, 'issued');
    const version = (await office.owner.visitor.get(`/api/versions/${issued}`)).body;
    const answer = await current(issued);
    const told = JSON.stringify([answer.body, [...answer.headers]]);
    for (const secret of [
      version.firmName,
      version.projectName,
      version.layoutName,
      version.label,
      version.createdBy.name,
      version.fingerprint.slice(0, 10),
      version.layoutId,
    ])
      expect(told).not.toContain(secret);
    expect(answer.headers.get('set-cookie')).toBeNull();
  });
});

describe('the sheets of a version', () => {
  test('say what it takes as its orders do, without prices; a client has the plan alone', async () => {
    const priced = await newPricedOffice();
    const { owner, designer, installer, client } = priced;
    const version = await sharedVersion(priced);
    const { fingerprint, terms } = (await client.visitor.get(`/api/versions/${version}/agreement`)).body; // prettier-ignore
    await client.visitor.post(`/api/versions/${version}/accept`, { typedName: 'C', fingerprint, terms }); // prettier-ignore
    await owner.visitor.post(`/api/versions/${version}/issue`);
    const { takeOff } = (await designer.visitor.get(`/api/versions/${version}/pricing`)).body;
    const sheets = async ({ visitor }: typeof owner) =>
      (await visitor.get(`/api/versions/${version}/sheets`)).body;
    const crew = await sheets(installer);
    const words = ({ orders }: { orders: { name: string; words: string }[] }) =>
      orders.map(({ name, words: amount }) => `${name}: ${amount}`);
    expect(words(crew.materials)).toEqual(words(takeOff));
    // In the catalogue's own packs, which a take-off without the catalogue knows nothing of.
    expect(words(crew.materials).join()).toMatch(/pallets? of 36/);
    expect(JSON.stringify(crew)).not.toMatch(/costMinor|"supplier"|\b41400\b|\b6250\b|Quennock/i);
    expect((await sheets(client)).materials).toBeNull();
  });

  test('bear when it was issued, what took its place, and the page’s whole address', async () => {
    const first = await versionThatIs(office, 'issued');
    const pack = async (id: string) =>
      (await office.installer.visitor.get(`/api/versions/${id}/sheets`)).body;
    const { events } = (await office.owner.visitor.get(`/api/versions/${first}`)).body;
    const issuedAt = events.find(({ kind }: { kind: string }) => kind === 'issued').at;
    expect((await pack(first)).stamp).toMatchObject({ issuedAt, supersededBy: null });
    const second = await versionThatIs(office, 'issued');
    const { number } = (await office.owner.visitor.get(`/api/versions/${second}`)).body;
    const { stamp } = await pack(first);
    expect(stamp.supersededBy.number).toBe(number);
    // Not from the request’s Host header.
    expect(new URL(stamp.currentUrl).origin).not.toBe(ORIGIN);
    expect(new URL(stamp.currentUrl).pathname).toBe(`/current/${first}`);
    expect((await current(first)).body.by).toBe(number);
  });

  test('are the whole pack to the firm and the crew, and the plan to a client', async () => {
    const issued = await versionThatIs(office, 'issued');
    for (const [visitor, sheets] of [
      [office.owner.visitor, 'all'],
      [office.designer.visitor, 'all'],
      [office.installer.visitor, 'all'],
      [office.client.visitor, 'plan'],
    ] as const)
      expect((await visitor.get(`/api/versions/${issued}/sheets`)).body.sheets).toBe(sheets);
  });
});
