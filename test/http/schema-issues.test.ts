import { describe, expect, it } from 'vitest';
import type { z } from 'zod';
import { fieldErrors, pointerOf, type SchemaIssue } from '../../src/http/schema-issues.ts';
import { ApprovalRequestSchema } from '../../src/http/schemas/approval-request.ts';
import { InductorSchema } from '../../src/http/schemas/inductor.ts';

const pointers = (schema: z.ZodType, body: unknown) =>
  fieldErrors((schema.safeParse(body).error?.issues ?? []) as unknown as SchemaIssue[], body).map(
    ({ pointer }) => pointer,
  );

describe('errors of a body, by pointer', () => {
  it('escapes as RFC 6901 section 5 does in its examples', () => {
    expect(['foo', '', 'a/b', 'c%d', 'm~n', ' '].map((key) => pointerOf([key]))).toEqual([
      '/foo',
      '/',
      '/a~1b',
      '/c%d',
      '/m~0n',
      '/ ',
    ]);
    expect(pointerOf(['foo', 0])).toBe('/foo/0');
    expect(pointerOf([])).toBe('');
  });

  it('picks the form of a union that the body was written for', () => {
    expect(pointers(InductorSchema, { coil: { shape: 'solenoid', turns: 'x', diameter_m: 1, length_m: 1 } })).toEqual([
      '/coil/turns',
    ]);
    expect(pointers(InductorSchema, { coil: { shape: 'helmet' } })).toEqual(['/coil/shape']);
    expect(pointers(InductorSchema, { sweep: { kind: 'differential', current_A: [0] } })).toContain(
      '/sweep/inductance_H',
    );
    expect(pointers(InductorSchema, { inductance_H: -1 })).toEqual(['/inductance_H']);
    expect(pointers(InductorSchema, 5)).toEqual(['']);
  });

  it('names limits that contradict each other, and a risk that no decision can be taken at', () => {
    const inductance = { nominal_H: 1, lower_H: 2, upper_H: 1 };
    const body = {
      part: { number: 'LG-1', revision: 'A', drawing: { inductance } },
      duty: { peakCurrent_A: 1, risk: 1e-308 },
    };
    expect(pointers(ApprovalRequestSchema, body).sort()).toEqual(['/duty/risk', '/part/drawing/inductance/upper_H']);
  });

  it('names a misspelt limit deep in an approval', () => {
    const body = {
      part: { number: 'LG-1', revision: 'A', drawing: { inductance: { nominal_H: 1, lower_H: 1, uper_H: 1 } } },
      duty: { peakCurrent_A: 1, required: { storedEnergy_J: '1' } },
    };
    expect(pointers(ApprovalRequestSchema, body).sort()).toEqual([
      '/duty/required/storedEnergy_J',
      '/part/drawing/inductance/uper_H',
      '/part/drawing/inductance/upper_H',
    ]);
  });
});
