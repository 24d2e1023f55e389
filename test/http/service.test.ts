import request from 'supertest';
import { describe, expect, it } from 'vitest';
import { testService, useService } from '../support/service.ts';

const api = useService({ BODY_LIMIT_BYTES: '4096' });

describe('the service', () => {
  it('is alive and ready', async () => {
    await request(api.server).get('/livez').expect(200, { status: 'ok' });
    await request(api.server).get('/readyz').expect(200, { status: 'ok' });
  });

  it('is not ready when the store does not answer, and says when to come back', async () => {
    const broken = await testService();
    broken.desk.store.ping = () => Promise.reject(new Error('disk gone'));
    const answer = await request(broken.app.server).get('/readyz');
    expect(answer.status).toBe(503);
    expect(answer.headers['retry-after']).toBe('5');
    expect(answer.body.type).toBe('urn:coilproof:problem:not-ready');
    expect(answer.text).not.toContain('disk gone');
    await broken.dispose();
  });

  it('publishes OpenAPI 3.1 and interactive documents of it', async () => {
    const { body } = await request(api.server).get('/openapi.json').expect(200);
    expect(body.openapi).toMatch(/^3\.1/);
    expect(Object.keys(body.paths)).toContain('/v1/approvals');
    await request(api.server).get('/docs/').expect(200).expect('content-type', /html/);
  });

  it('counts requests by route pattern, not by path', async () => {
    await request(api.server).get('/v1/approvals/some-id');
    const { text } = await request(api.server)
      .get('/metrics')
      .expect(200)
      .expect('content-type', /text\/plain/);
    expect(text).toContain('http_request_duration_seconds_count{method="GET",route="/v1/approvals/:id",status="404"}');
    expect(text).not.toContain('some-id');
  });

  it('takes a well-formed request id and makes one otherwise; the problem and the log have it', async () => {
    const given = await request(api.server).get('/nowhere').set('x-request-id', 'rig-7.42');
    expect(given.headers['x-request-id']).toBe('rig-7.42');
    expect(given.body.instance).toBe('urn:coilproof:request:rig-7.42');
    expect(api.service().logLines.some((line) => line.includes('"reqId":"rig-7.42"'))).toBe(true);
    const made = await request(api.server).get('/livez').set('x-request-id', 'no spaces');
    expect(made.headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
  });

  it('never logs a body', async () => {
    await request(api.server).post('/v1/conformity').send({ measured: 1, secretField: 'do-not-log-me' }).expect(422);
    expect(api.service().logLines.join('')).not.toContain('do-not-log-me');
  });

  it('fails closed on a fault of its own: an id for the log, nothing of the cause', async () => {
    const faulty = await testService();
    faulty.desk.store.get = () => Promise.reject(new Error('secret path /var/lib'));
    const answer = await request(faulty.app.server).get('/v1/approvals/x').expect(500);
    expect(answer.headers['content-type']).toContain('application/problem+json');
    expect(answer.text).not.toContain('secret');
    expect(faulty.logLines.join('')).toContain('secret path');
    await faulty.dispose();
  });
});

describe('what goes wrong is a problem document', () => {
  const expectProblem = (answer: request.Response, status: number, code: string) => {
    expect([answer.status, answer.body.type]).toEqual([status, `urn:coilproof:problem:${code}`]);
    expect(answer.headers['content-type']).toMatch(/^application\/problem\+json/);
    expect(answer.body).toMatchObject({ status, title: expect.any(String), detail: expect.any(String) });
  };
  const post = (body: string, type = 'application/json') =>
    request(api.server).post('/v1/conformity').set('content-type', type).send(body);

  it('404 for a path that is not there', async () => {
    expectProblem(await request(api.server).get('/v2/conformity'), 404, 'not-found');
  });

  it('405 for a path that does not know the method, with Allow', async () => {
    const answer = await request(api.server).delete('/v1/approvals');
    expectProblem(answer, 405, 'method-not-allowed');
    expect(answer.headers.allow).toBe('GET, POST');
    const withParameter = await request(api.server).delete('/v1/approvals/x');
    expectProblem(withParameter, 405, 'method-not-allowed');
    expect(withParameter.headers.allow).toBe('GET');
  });

  it.each([
    ['broken JSON', '{"measured":'],
    ['an empty body', ''],
    ['a text that is no JSON', 'NaN'],
    ['a prototype key', '{"__proto__": {"measured": 1}}'],
  ])('400 for %s', async (_name, body) => {
    expectProblem(await post(body), 400, 'malformed-request');
  });

  it('400 for no body at all', async () => {
    expectProblem(await request(api.server).post('/v1/conformity'), 400, 'malformed-request');
  });

  it('415 for another media type', async () => {
    expectProblem(await post('<a/>', 'application/xml'), 415, 'unsupported-media-type');
  });

  it('413 for a body over the limit: megabytes of digits end there', async () => {
    expectProblem(await post(`{"measured": 1${'0'.repeat(5000)}}`), 413, 'too-large');
  });

  it.each([
    ['digits beyond a double', `{"measured": 1${'0'.repeat(400)}, "standardUncertainty": 1, "upper": 2}`, '/measured'],
    ['1e999', '{"measured": 1e999, "standardUncertainty": 1, "upper": 2}', '/measured'],
    ['deep nesting', `{"measured": ${'['.repeat(1500)}${']'.repeat(1500)}}`, '/measured'],
    ['a missing field', '{"measured": 1, "upper": 2}', '/standardUncertainty'],
    ['an unknown field', '{"measured": 1, "standardUncertainty": 1, "upper": 2, "uper": 3}', '/uper'],
    ['a key that needs escaping', '{"measured": 1, "standardUncertainty": 1, "upper": 2, "a/b~c": 3}', '/a~1b~0c'],
    ['null', '{"measured": null, "standardUncertainty": 1, "upper": 2}', '/measured'],
    ['a number as text', '{"measured": "1", "standardUncertainty": 1, "upper": 2}', '/measured'],
    ['an array for the body', '[1]', ''],
  ])('422 for %s, naming the field', async (_name, body, pointer) => {
    const answer = await post(body);
    expectProblem(answer, 422, 'invalid-body');
    expect(answer.body.errors.map((error: { pointer: string }) => error.pointer)).toContain(pointer);
  });

  it('400 for a query parameter that is misspelt or out of range', async () => {
    expectProblem(await request(api.server).get('/v1/approvals?verdct=approve'), 400, 'invalid-parameter');
    expectProblem(await request(api.server).get('/v1/approvals?limit=0'), 400, 'invalid-parameter');
    expectProblem(await request(api.server).get('/v1/approvals?after=x'), 400, 'invalid-parameter');
  });

  it('400 for a URL that cannot be decoded', async () => {
    expectProblem(await request(api.server).get('/v1/approvals/%E0%A4%A'), 400, 'invalid-parameter');
  });
});
