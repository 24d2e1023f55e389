import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { testService } from '../support/service.ts';
import { STORES, type StorePlace } from '../support/stores.ts';

const ferrite = { initialPermeability: 2000, saturation: { fluxDensity_T: 0.4 } };
const rig = { instrument: { inductance: { relative: 0.01 } }, calibrationDue: '2026-06-30' };
const drawing = { inductance: { nominal_H: 1e-3, lower_H: 9e-4, upper_H: 1.1e-3 } };
const cored = (material: unknown) => ({
  shape: 'cored',
  turns: 50,
  core: { effectiveArea_m2: 1e-4, effectiveLength_m: 0.1, material },
});
const sweep = { kind: 'differential', current_A: [0, 1, 2], inductance_H: [1e-3, 1e-3, 1e-3] };

describe.each(STORES)('the registry on $engine', ({ make }) => {
  let place: StorePlace;
  let service: Awaited<ReturnType<typeof testService>>;
  const api = () => request(service.app.server);
  beforeAll(async () => {
    place = await make();
    service = await testService(place.environment);
  });
  afterAll(async () => {
    await service.dispose();
    await place.remove();
  });

  it('creates, answers with a tag, and changes nothing for the same content', async () => {
    const created = await api().put('/v1/materials/ferrite-a').send(ferrite).expect(201, ferrite);
    expect(created.headers.location).toBe('/v1/materials/ferrite-a');
    const again = await api()
      .put('/v1/materials/ferrite-a')
      .send({ saturation: { fluxDensity_T: 0.4 }, initialPermeability: 2000 })
      .expect(200);
    expect(again.headers.etag).toBe(created.headers.etag);
    const read = await api().get('/v1/materials/ferrite-a').expect(200, ferrite);
    expect(read.headers.etag).toBe(created.headers.etag);
    await api().get('/v1/materials/ferrite-a').set('if-none-match', read.headers.etag!).expect(304);
    await api().get('/v1/materials/ferrite-a').set('if-none-match', '"other"').expect(200);
  });

  it('writes only where the precondition holds', async () => {
    const { headers } = await api().put('/v1/rigs/bench-1').set('if-none-match', '*').send(rig).expect(201);
    await api().put('/v1/rigs/bench-1').set('if-none-match', '*').send(rig).expect(412);
    const newer = { ...rig, calibrationDue: '2027-06-30' };
    await api().put('/v1/rigs/bench-1').set('if-match', '"stale"').send(newer).expect(412);
    await api().get('/v1/rigs/bench-1').expect(200, rig);
    await api().put('/v1/rigs/bench-1').set('if-match', headers.etag!).send(newer).expect(200, newer);
    await api().put('/v1/rigs/nobody').set('if-match', '*').send(rig).expect(412);
    await api().put('/v1/rigs/bench-1').set('if-match', 'unquoted').send(rig).expect(400);
  });

  it('lets one of two writers win who both saw the same', async () => {
    const { headers } = await api().put('/v1/rigs/contested').send(rig).expect(201);
    const answers = await Promise.all(
      ['2027-01-01', '2027-01-02'].map((calibrationDue) =>
        api()
          .put('/v1/rigs/contested')
          .set('if-match', headers.etag!)
          .send({ ...rig, calibrationDue }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 412]);
  });

  it('never changes a released revision, and lists parts and revisions in pages', async () => {
    await api()
      .put('/v1/parts/LG-1/revisions/A')
      .send({ drawing })
      .expect(201, { number: 'LG-1', revision: 'A', drawing });
    await api().put('/v1/parts/LG-1/revisions/A').send({ drawing }).expect(200);
    const changed = await api().put('/v1/parts/LG-1/revisions/A').send({ drawing, description: 'changed' });
    expect([changed.status, changed.body.type]).toEqual([409, 'urn:coilproof:problem:conflict']);
    await api().put('/v1/parts/LG-1/revisions/B').send({ drawing }).expect(201);
    await api().put('/v1/parts/LG-10/revisions/A').send({ drawing }).expect(201);
    const odd = encodeURIComponent('LG/2 ä');
    await api().put(`/v1/parts/${odd}/revisions/A`).send({ drawing }).expect(201);
    expect((await api().get(`/v1/parts/${odd}/revisions/A`)).body.number).toBe('LG/2 ä');
    const revisions = await api().get('/v1/parts/LG-1').expect(200);
    expect(revisions.body.parts.map((part: { revision: string }) => part.revision)).toEqual(['A', 'B']);
    const seen: string[] = [];
    let after: string | null = '';
    while (after !== null) {
      const page: request.Response = await api()
        .get('/v1/parts')
        .query({ limit: 2, ...(after && { after }) })
        .expect(200);
      seen.push(
        ...page.body.parts.map((part: { number: string; revision: string }) => `${part.number} ${part.revision}`),
      );
      after = page.body.after;
    }
    expect(seen).toHaveLength(4);
    expect(new Set(seen).size).toBe(4);
    await api().get('/v1/parts/nobody').expect(404);
  });

  it('names the field of a reference that leads nowhere', async () => {
    const lot = await api()
      .put('/v1/lots/L-1')
      .send({ part: { number: 'nobody', revision: 'A' } });
    expect([lot.status, lot.body.errors[0].pointer]).toEqual([422, '/part']);
    const part = await api()
      .put('/v1/parts/LG-3/revisions/A')
      .send({ construction: { coil: cored('unobtainium') } });
    expect([part.status, part.body.errors[0].pointer]).toEqual([422, '/construction/coil/core/material']);
    const energy = await api()
      .post('/v1/energy')
      .send({ inductor: { coil: cored('unobtainium') }, current_A: 1 });
    expect([energy.status, energy.body.errors[0].pointer]).toEqual([422, '/inductor/coil/core/material']);
    const approval = await api()
      .post('/v1/approvals')
      .send({ part: { number: 'nobody', revision: 'A' }, duty: { peakCurrent_A: 1 } });
    expect([approval.status, approval.body.errors[0].pointer]).toEqual([422, '/part']);
  });

  it('keeps a lot with its part', async () => {
    await api()
      .put('/v1/lots/L-2')
      .send({ part: { number: 'LG-1', revision: 'A' } })
      .expect(201);
    await api()
      .put('/v1/lots/L-2')
      .send({ part: { number: 'LG-1', revision: 'A' }, size: 5 })
      .expect(200);
    await api()
      .put('/v1/lots/L-2')
      .send({ part: { number: 'LG-1', revision: 'B' } })
      .expect(409);
  });

  it('calculates with a registered material as with the same one inline', async () => {
    const [byId, inline] = await Promise.all(
      ['ferrite-a', ferrite].map((material) =>
        api()
          .post('/v1/energy')
          .send({ inductor: { coil: cored(material) }, current_A: 2 }),
      ),
    );
    expect(byId!.status).toBe(200);
    expect(byId!.body).toEqual(inline!.body);
  });

  it('approves a registered part, and records what its references stood for', async () => {
    await api()
      .put('/v1/parts/LG-4/revisions/A')
      .send({ drawing, construction: { coil: cored('ferrite-a') } })
      .expect(201);
    const unit = { serial: 'U-1', measuredAt: '2026-06-30T23:30:00+02:00', rig: 'on-time', sweep };
    await api().put('/v1/rigs/on-time').send(rig);
    const { body, status } = await api()
      .post('/v1/approvals')
      .send({ part: { number: 'LG-4', revision: 'A' }, duty: { peakCurrent_A: 1 }, evidence: { units: [unit] } });
    expect(status).toBe(201);
    expect(body.part.construction.coil.core.material).toEqual(ferrite);
    expect(body.evidence.units[0].instrument).toEqual(rig.instrument);
    expect(body.references.map(({ kind, id }: { kind: string; id: string }) => `${kind} ${id}`)).toEqual([
      'part LG-4/A',
      'rig on-time',
      'material ferrite-a',
    ]);
    await api().put('/v1/materials/ferrite-a').send({ initialPermeability: 1 }).expect(200);
    expect((await api().get(`/v1/approvals/${body.id}`)).body).toEqual(body);
  });

  it('leaves a reading of a rig out of calibration undecided, and says so', async () => {
    await api().put('/v1/rigs/late').send(rig);
    const unit = { serial: 'U-2', measuredAt: '2026-07-01T00:00:00Z', rig: 'late', sweep };
    const { body } = await api()
      .post('/v1/approvals')
      .send({ part: { number: 'LG-1', revision: 'A' }, duty: { peakCurrent_A: 1 }, evidence: { units: [unit] } });
    expect(body.verdict).toBe('refer');
    expect(body.checks[0]).toMatchObject({ check: 'measured-inductance', outcome: 'inconclusive' });
    expect(body.checks[0].detail).toMatch(/calibration of rig late ended on 2026-06-30/);
  });
});
