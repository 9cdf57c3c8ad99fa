import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { verifyPassword } from '@/lib/server/password';
import { demoPeople } from '@/seeders/demo-people';
import { seedDemo } from '@/seeders/seed-demo';
import { freshDatabase } from '../../support/server-database';

let database: Awaited<ReturnType<typeof freshDatabase>>;
let summary: Awaited<ReturnType<typeof seedDemo>>;
let seconds: number;

beforeAll(async () => {
  database = await freshDatabase();
  const start = performance.now();
  summary = await seedDemo();
  seconds = (performance.now() - start) / 1000;
});
afterAll(async () => database.close());

async function projectId(name: string): Promise<string> {
  const project = await database.models.Project.findOne({ where: { name } });
  return project!.id;
}

describe('sowing the demo', () => {
  it('fills an empty database within 30 s and says so', () => {
    expect(summary.state).toBe('sown');
    expect(seconds).toBeLessThan(30);
  });

  it('the estate: 60 plots, 30 visits, more than 400 stems with heights; every record came through the change log', async () => {
    const where = { projectId: await projectId('Velmarrow estate') };
    const { models } = database;
    expect(await models.Plot.count({ where })).toBe(60);
    expect(await models.Stratum.count({ where })).toBe(4);
    expect(await models.Visit.count({ where })).toBe(30);
    const records = await Promise.all([models.Project, models.Stratum, models.SpeciesEntry, models.Plot, models.Visit, models.Tree, models.Stem, models.StemMeasurement, models.Reading, models.HeightCurve]
      .map((model) => (model as typeof models.Plot).count({ where })));
    const created = await models.ChangeLogEntry.count({ where: { ...where, kind: 'create', state: 'applied' } });
    expect(created).toBe(records.reduce((sum, count) => sum + count, 0));
  });

  it('the tract: the 31 black cherry trees in the units stated, and their curve with breast height 4.5 ft', async () => {
    const where = { projectId: await projectId('Dunmorrow tract') };
    const trees = await database.models.ReferenceTree.findAll({ where });
    expect(trees).toHaveLength(31);
    expect(new Set(trees.map(({ dbhUnit, heightUnit }) => `${dbhUnit} ${heightUnit}`))).toEqual(new Set(['in ft']));
    // 1 in = 2.54 cm: the sum of the diameters is 410.7 in (data set trees of R).
    expect(trees.reduce((sum, { dbhCm }) => sum + dbhCm, 0)).toBeCloseTo(410.7 * 2.54, 6);
    const curve = await database.models.HeightCurve.findOne({ where: { ...where, curveGroup: 'black cherry' } });
    expect(curve).toMatchObject({ form: 'curtis', n: 31, plots: 0 });
    // Table of the statistics page for the Curtis form (least squares in double precision).
    expect(curve!.b0 / 3.2945003114).toBeCloseTo(1, 9);
    expect(curve!.b1 / 7.0367459933).toBeCloseTo(1, 9);
    expect(curve!.breastHeightM).toBeCloseTo(1.3716, 12);
  });

  it('the estate’s curves come from its earlier visits: one for each known group, with its plots', async () => {
    const curves = await database.models.HeightCurve.findAll({ where: { projectId: await projectId('Velmarrow estate') } });
    const groups = curves.map(({ curveGroup }) => curveGroup);
    for (const group of ['spruce-fir', 'beech', 'pine']) expect(groups).toContain(group);
    for (const curve of curves.filter(({ curveGroup }) => curveGroup !== '*')) {
      expect(curve.n).toBeGreaterThan(30);
      expect(curve.plots).toBeGreaterThan(8);
      expect(curve.breastHeightM).toBe(1.3);
    }
  });

  it('people sign in with the passwords printed and belong to the projects as said', async () => {
    const estate = await projectId('Velmarrow estate');
    const tract = await projectId('Dunmorrow tract');
    for (const person of demoPeople) {
      const user = await database.models.User.findOne({ where: { email: person.email } });
      expect(user!.admin).toBe(person.admin);
      expect(await verifyPassword(person.password, user!.passwordHash)).toBe(true);
      const roles = new Map((await database.models.Membership.findAll({ where: { userId: user!.id } })).map((row) => [row.projectId, row.role]));
      expect(roles.get(estate) ?? null).toBe(person.estateRole);
      expect(roles.get(tract) ?? null).toBe(person.tractRole);
    }
  });

  it('sown again it keeps the data, what people changed included', async () => {
    const { models } = database;
    const before = await models.ChangeLogEntry.count();
    await models.User.update({ name: 'Another Name' }, { where: { email: demoPeople[0]!.email } });
    expect((await seedDemo()).state).toBe('kept');
    expect(await models.ChangeLogEntry.count()).toBe(before);
    expect((await models.User.findOne({ where: { email: demoPeople[0]!.email } }))!.name).toBe('Another Name');
  });

  it('a sowing that was cut short is finished without a second copy of anything', async () => {
    const { models } = database;
    const before = await Promise.all([models.User.count(), models.Project.count(), models.Visit.count(), models.ReferenceTree.count(), models.HeightCurve.count()]);
    await models.ServerMeta.update({ value: 'sowing' }, { where: { key: 'demo' } });
    expect((await seedDemo()).state).toBe('sown');
    expect(await Promise.all([models.User.count(), models.Project.count(), models.Visit.count(), models.ReferenceTree.count(), models.HeightCurve.count()])).toEqual(before);
  });
});

describe('a database that is no demo', () => {
  it('is not touched', async () => {
    await database.close();
    database = await freshDatabase();
    const { createUser } = await import('@/lib/server/create-user');
    await createUser({ email: 'owner@forest.example', name: 'Owner', password: 'a long pass phrase 7', admin: true });
    expect(await seedDemo()).toEqual({ state: 'foreign' });
    expect(await database.models.User.count()).toBe(1);
    expect(await database.models.Project.count()).toBe(0);
  });
});
