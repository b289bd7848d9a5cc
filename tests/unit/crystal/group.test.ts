import { describe, expect, it } from 'vitest';
import {
  closeGroup,
  distinctRotations,
  isClosed,
  operationSetKey,
  uniqueOperations,
} from '#src/crystal/group.ts';
import { operationSetFingerprint } from '#src/crystal/set-fingerprint.ts';
import { formatOperation, parseOperation } from '#src/crystal/symmetry-operation.ts';

const operations = (texts: string) => texts.split(' ').map((text) => parseOperation(text)!);
const texts = (list: readonly { rotation: unknown; translation: unknown }[]) =>
  list.map((operation) => formatOperation(operation as never));

describe('uniqueOperations', () => {
  it('puts the identity first and drops repetitions modulo the lattice', () => {
    expect(texts(uniqueOperations(operations('-x,-y,-z x,y,z -x+1,-y,-z')))).toEqual(['x,y,z', '-x,-y,-z']);
    expect(texts(uniqueOperations(operations('-x,-y,-z')))).toEqual(['x,y,z', '-x,-y,-z']);
    expect(texts(uniqueOperations([]))).toEqual(['x,y,z']);
  });
});

describe('closeGroup', () => {
  it('generates P 21/c from two operations, the given ones first', () => {
    const group = closeGroup(operations('-x,y+1/2,-z+1/2 -x,-y,-z'))!;
    expect(texts(group)).toEqual(['x,y,z', '-x,y+1/2,-z+1/2', '-x,-y,-z', 'x,-y+1/2,z+1/2']);
  });

  it('generates the 192 operations of F m -3 m', () => {
    const group = closeGroup(operations('y,z,x -y,x,z -x,-y,-z x,y+1/2,z+1/2 x+1/2,y,z+1/2'))!;
    expect(group).toHaveLength(192);
    expect(distinctRotations(group)).toHaveLength(48);
    expect(isClosed(group)).toMatchObject({ closed: true, missing: [], hasIdentity: true, duplicates: [] });
  });

  it('gives up at its limit', () => {
    const drifting = [{ rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1], translation: [0.0137, 0, 0] }] as const;
    expect(closeGroup(drifting)).toBeNull();
    expect(closeGroup(operations('x+1/24,y,z'), 23)).toBeNull();
    expect(closeGroup(operations('x+1/24,y,z'), 24)).toHaveLength(24);
  });
});

describe('isClosed', () => {
  it('names what is missing, repeated or without inverse', () => {
    const check = isClosed(operations('x,y,z -y,x-y,z -y,x-y,z+1 -x,-y,-z'));
    expect(check.closed).toBe(false);
    expect(texts(check.missing).sort()).toEqual(['-x+y,-x,z', 'x-y,x,-z', 'y,-x+y,-z']);
    expect(check.duplicates).toEqual([2]);
    expect(check.withoutInverse).toEqual([1, 2]);
  });

  it('notices a missing identity and an unbounded list', () => {
    expect(isClosed(operations('-x,-y,-z'))).toMatchObject({ hasIdentity: false, closed: false });
    const drifting = { rotation: [-1, 0, 0, 0, -1, 0, 0, 0, -1], translation: [0.0137, 0, 0] } as const;
    expect(isClosed([...operations('x,y,z -x,-y,-z'), drifting])).toMatchObject({
      closed: false,
      unbounded: true,
    });
  });
});

describe('keys of whole sets', () => {
  it('do not depend on order, repetition or lattice translations', () => {
    const [one, other] = [operations('x,y,z -x,y+1/2,-z'), operations('-x,y-1/2,-z+1 x,y,z x,y,z')];
    expect(operationSetKey(one)).toBe(operationSetKey(other));
    expect(operationSetFingerprint(one)).toBe(operationSetFingerprint(other));
    expect(operationSetKey(one)).not.toBe(operationSetKey(operations('x,y,z -x,y,-z')));
  });
});
