import type { LayoutDocument } from '@/paving/layout-document';
import { putOnProject } from '@/server/projects';
import { court, newFirm, newMember, newProject, newVersion, type Signed } from './firm';
import { db } from './site';

/** A firm with a catalogue, its prices, and a floor that is drawn with what the catalogue sells. */
export interface PricedOffice {
  readonly owner: Signed;
  readonly designer: Signed;
  readonly installer: Signed;
  readonly client: Signed;
  readonly projectId: string;
  readonly layoutId: string;
  readonly stone: string;
  readonly pit: string;
  readonly slab: string;
  readonly gravel: string;
}

const made = async ({ visitor }: Signed, path: string, body: unknown): Promise<string> => {
  const answer = await visitor.post(path, body);
  if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
  return answer.body.id;
};

/** The court in the catalogue's slab and gravel. */
export const pricedCourt = (slab: string, gravel: string): LayoutDocument => {
  const document = court();
  return {
    ...document,
    units: document.units.map((unit) => ({ ...unit, catalogueId: slab })),
    aggregate: { name: 'River gravel 10 mm', colour: '#a89f8d', catalogueId: gravel },
  };
};

export const newPricedOffice = async (): Promise<PricedOffice> => {
  const owner = await newFirm();
  const { firmId } = owner.actor;
  const settings = {
    revision: 0,
    currency: 'GBP',
    taxName: 'VAT',
    taxBasisPoints: 2000,
    marginBasisPoints: 2500,
    labourAreaMinor: 4500,
    labourHourMinor: 3200,
    quoteTerms: 'Half when the work begins.',
    orderTerms: 'Unload with care.',
    address: '4 Withy Lane\nNether Tarrow',
    email: 'desk@firm.example',
    registration: 'ST 000 001',
  };
  const set = await owner.visitor.patch('/api/firm/pricing', settings);
  if (set.status !== 200) throw new Error(JSON.stringify(set.body));
  const designer = await newMember(firmId, 'designer');
  const installer = await newMember(firmId, 'installer');
  const client = await newMember(firmId, 'client');
  const stone = await made(owner, '/api/suppliers', {
    name: 'Quennock Stone',
    email: 'orders@quennock.example',
    address: 'Quarry Road',
  });
  const pit = await made(owner, '/api/suppliers', { name: 'Over Pit', email: '' });
  const slab = await made(owner, '/api/catalogue', {
    kind: 'unit',
    name: 'Slab 450',
    code: '=QS450',
    supplierId: stone,
    packName: 'pallet',
    packHolds: 36,
    length: 450,
    width: 450,
    thickness: 50,
    massKg: 23,
    price: { costMinor: 41_400, from: '2026-01-01' },
  });
  const gravel = await made(owner, '/api/catalogue', {
    kind: 'aggregate',
    name: 'River gravel 10 mm',
    supplierId: pit,
    packName: 'bulk bag',
    packHolds: 0.8,
    packMeasure: 't',
    looseDensity: 1650,
    stoneLeast: 5,
    stoneGreatest: 10,
    price: { costMinor: 6250, from: '2026-01-01' },
  });
  const { projectId, layoutId } = await newProject(designer.visitor, pricedCourt(slab, gravel));
  for (const { actor } of [installer, client]) {
    await putOnProject(await db(), firmId, projectId, actor.personId);
  }
  return { owner, designer, installer, client, projectId, layoutId, stone, pit, slab, gravel };
};

/** A version of the office's floor that the client sees. */
export const sharedVersion = async (office: PricedOffice): Promise<string> => {
  const { id } = await newVersion(office.designer.visitor, office.layoutId);
  await office.designer.visitor.post(`/api/versions/${id}/share`);
  return id;
};
