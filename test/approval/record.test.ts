import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { digestOf, isIntact, seal } from '../../src/approval/record.ts';

describe('the digest of a record', () => {
  it('is the SHA-256 of RFC 8785 canonical JSON: its own example of key order and number form', () => {
    // RFC 8785, 3.2.2 and 3.2.3: numbers in shortest form, keys sorted by UTF-16 code units.
    const value = { numbers: [Number('333333333.33333329'), 1e30, 4.5, 2e-3, 1e-27], literals: [null, true, false] };
    const canonical = '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27]}';
    expect(digestOf(value)).toBe(createHash('sha256').update(canonical).digest('hex'));
  });

  it('does not depend on the order of keys, and does on every value', () => {
    expect(digestOf({ a: 1, b: [2, { c: 3, d: 4 }] })).toBe(digestOf({ b: [2, { d: 4, c: 3 }], a: 1 }));
    expect(digestOf({ a: 1 })).not.toBe(digestOf({ a: 1.0000000000000002 }));
  });

  it('seals the request apart and chains to the record before', () => {
    const first = seal({ q: 1 }, { id: 'one' }, null);
    const second = seal({ q: 1 }, { id: 'two' }, first.digests.record);
    expect(Object.keys(first)).toEqual(['id', 'digests']);
    expect(first.digests.input).toBe(second.digests.input);
    expect(second.digests.previous).toBe(first.digests.record);
    expect([first, second].every(isIntact)).toBe(true);
  });

  it('shows a change of any part, of the chain too', () => {
    const sealed = seal({}, { id: 'one', checks: [{ margin: 1 }] }, 'before');
    expect(isIntact({ ...sealed, id: 'two' })).toBe(false);
    expect(isIntact({ ...sealed, checks: [{ margin: 2 }] })).toBe(false);
    expect(isIntact({ ...sealed, digests: { ...sealed.digests, previous: null } })).toBe(false);
    expect(isIntact({ ...sealed, digests: { ...sealed.digests, input: 'x' } })).toBe(false);
  });
});
