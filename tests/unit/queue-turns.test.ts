import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { laneOf, pickFiles, TURN_BYTES, TURN_FACES, TURN_FILES, type Candidate } from '@/lib/imports/pick-files';
import { MemoryLedger } from '@/lib/jobs/memory-ledger';
import { MemoryFault, passingFaultOf } from '@/lib/jobs/passing-fault';
import { inTurn, nowOf, type Turn } from '@/lib/rules/fair-turns';

const MB = 1024 * 1024;

const file = (id: string, given: Partial<Candidate> = {}): Candidate => ({ id, importId: 'import', asset: id, byteSize: 1000, faces: 30, memory: 200 * MB, isOut: false, ...given });
const large = (id: string, given: Partial<Candidate> = {}) => file(id, { byteSize: 400 * MB, faces: 10_000_000, memory: 9_000 * MB, ...given });
const roomOf = (bytes: number) => () => bytes;
const idsOf = (files: readonly Candidate[]) => files.map((one) => one.id);

describe('a turn', () => {
  test('takes files in their order up to its budget of files, bytes and faces', () => {
    const many = Array.from({ length: 100 }, (_, n) => file(`f${n}`));
    expect(idsOf(pickFiles(many, 'small', roomOf(Infinity)).picked)).toEqual(idsOf(many.slice(0, TURN_FILES)));
    const heavy = many.map((one) => ({ ...one, byteSize: TURN_BYTES / 4 }));
    expect(pickFiles(heavy, 'small', roomOf(Infinity)).picked).toHaveLength(4);
    const dense = many.map((one) => ({ ...one, faces: TURN_FACES / 3 }));
    expect(pickFiles(dense, 'small', roomOf(Infinity)).picked).toHaveLength(3);
  });

  test('is one large file, or small ones, never both', () => {
    const files = [file('a'), large('b'), file('c')];
    expect(files.map(laneOf)).toEqual(['small', 'large', 'small']);
    expect(idsOf(pickFiles(files, 'small', roomOf(Infinity)).picked)).toEqual(['a', 'c']);
    expect(idsOf(pickFiles([...files, large('d')], 'large', roomOf(Infinity)).picked)).toEqual(['b']);
  });

  test('leaves what does not fit and names the first that did not', () => {
    const { picked, tooLarge } = pickFiles([large('b'), large('c', { memory: 1000 * MB })], 'large', roomOf(2000 * MB));
    expect(idsOf(picked)).toEqual(['c']);
    expect(tooLarge?.id).toBe('b');
    expect(pickFiles([large('b', { memory: Infinity })], 'large', roomOf(2000 * MB))).toEqual({ picked: [], tooLarge: null });
  });

  test('never takes a file before an earlier one of its asset that is not with it', () => {
    const candidate = fc.record({
      asset: fc.constantFrom('ox', 'pig', 'hen', null),
      isLarge: fc.boolean(),
      isOut: fc.boolean(),
      memory: fc.constantFrom(100 * MB, 900 * MB),
    });
    fc.assert(
      fc.property(fc.array(candidate, { maxLength: 60 }), fc.constantFrom('small' as const, 'large' as const), (given, lane) => {
        const files = given.map(({ asset, isLarge, isOut, memory }, n) => (isLarge ? large : file)(`f${n}`, { asset, isOut, memory }));
        const { picked } = pickFiles(files, lane, roomOf(500 * MB));
        const taken = new Set(idsOf(picked));
        for (const one of picked) {
          expect(one.isOut).toBe(false);
          expect(one.memory).toBeLessThanOrEqual(500 * MB);
          const earlier = files.slice(0, files.indexOf(one)).filter((other) => other.asset !== null && other.asset === one.asset);
          expect(earlier.every((other) => taken.has(other.id))).toBe(true);
        }
      }),
    );
  });
});

describe('whose turn it is', () => {
  /** Takes turns of the given work for as long as anybody has some, and answers who took them. */
  function play(work: Record<string, number[]>, arrivesAt: Record<string, number> = {}): string[] {
    const turns = new Map<string, Turn>();
    const left = new Map(Object.entries(work).map(([name, all]) => [name, [...all]]));
    const taken: string[] = [];
    for (;;) {
      const here = [...left].filter(([name, all]) => all.length > 0 && taken.length >= (arrivesAt[name] ?? 0)).map(([name]) => name);
      if (here.length === 0) return taken;
      const [{ name, begins }] = inTurn(here, (one) => turns.get(one), nowOf([...turns.values()]));
      turns.set(name, { began: begins, ended: begins + left.get(name)!.shift()! });
      taken.push(name);
    }
  }

  test('a newcomer is next but for what is under way, however much others have left', () => {
    const taken = play({ big: Array<number>(125).fill(40), late: [3] }, { late: 60 });
    expect(taken.indexOf('late')).toBeLessThanOrEqual(61);
  });

  test('equal work goes to all that wait, whatever the size of their turns', () => {
    const taken = play({ coarse: Array<number>(20).fill(100), fine: Array<number>(2000).fill(1) });
    const lastCoarse = taken.lastIndexOf('coarse');
    const fine = taken.slice(0, lastCoarse).filter((name) => name === 'fine').length;
    // Nineteen large turns lie before the last one begins; the other had as much, to within one large turn.
    expect(Math.abs(fine - 19 * 100)).toBeLessThanOrEqual(100);
  });

  test('nobody saves up turns by staying away, and nobody is kept waiting by newcomers', () => {
    const work: Record<string, number[]> = { steady: Array<number>(200).fill(10) };
    const arrivesAt: Record<string, number> = {};
    for (let n = 0; n < 100; n++) {
      work[`guest${n}`] = [10];
      arrivesAt[`guest${n}`] = 2 * n;
    }
    const taken = play(work, arrivesAt);
    const steady = taken.slice(0, 200).filter((name) => name === 'steady').length;
    expect(steady).toBeGreaterThanOrEqual(99);
    const away = play({ a: Array<number>(100).fill(10), b: [10, ...Array<number>(50).fill(10)] }, { b: 50 });
    const after = away.slice(50, 90);
    expect(after.filter((name) => name === 'b').length).toBeLessThanOrEqual(21);
  });
});

describe('the memory of a process', () => {
  test('holds no more than its budget, however files come and go', () => {
    fc.assert(
      fc.property(fc.array(fc.record({ bytes: fc.integer({ min: 1, max: 120 }), ends: fc.boolean() }), { maxLength: 200 }), (steps) => {
        const ledger = new MemoryLedger(100);
        const held = new Map<string, number>();
        for (const [n, { bytes, ends }] of steps.entries()) {
          const id = `f${n}`;
          if (bytes <= ledger.roomFor(id)) {
            ledger.hold(id, bytes);
            ledger.forget(id);
            held.set(id, bytes);
          } else if (bytes <= 100) ledger.passOver(id, bytes);
          const [first] = held.keys();
          if (ends && first !== undefined) {
            ledger.hold(first, 0);
            held.delete(first);
          }
          expect([...held.values()].reduce((sum, one) => sum + one, 0)).toBeLessThanOrEqual(100);
        }
      }),
    );
  });

  test('small files go on beside a large one that waits, and it gets its room though they never end all at once', () => {
    const ledger = new MemoryLedger(100);
    ledger.hold('s0', 10);
    ledger.hold('s1', 10);
    let begun = 0;
    let turns = 0;
    // Each turn one small file ends and, where there is room for it, the next begins.
    for (; ledger.roomFor('huge') < 90 && turns < 50; turns++) {
      ledger.passOver('huge', 90);
      ledger.hold(`s${turns}`, 0);
      if (ledger.roomFor('small') >= 10) {
        ledger.hold(`s${turns + 2}`, 10);
        begun++;
      }
    }
    expect(begun).toBeGreaterThan(0);
    expect(turns).toBeLessThan(10);
    ledger.hold('huge', 90);
    ledger.forget('huge');
    expect(ledger.keptFor).toBeNull();
  });

  test('room that is kept for a file that does not wait any more goes back to all', () => {
    const ledger = new MemoryLedger(100);
    for (let n = 0; n < 10; n++) ledger.passOver('huge', 100);
    expect(ledger.keptFor).toBe('huge');
    expect(ledger.roomFor('small')).toBe(0);
    ledger.forget('huge');
    expect(ledger.roomFor('small')).toBe(100);
  });
});

describe('faults that may pass', () => {
  const withCode = (message: string, given: Record<string, unknown>, cause?: unknown) => Object.assign(new Error(message, { cause }), given);
  test.each([
    ['storage out of reach', withCode('EIO: i/o error, read', { code: 'EIO', syscall: 'read' }), 'storage'],
    ['the same out of a thread, which loses an error’s fields', new Error("EIO: i/o error, open '/files/blobs/ab'"), 'storage'],
    ['a server that does not answer', new Error('Failed query', { cause: withCode('connect ECONNREFUSED 127.0.0.1:5999', { code: 'ECONNREFUSED', syscall: 'connect' }) }), 'network'],
    ['the same out of a thread', new Error('connect ECONNREFUSED 127.0.0.1:9000'), 'network'],
    ['a full disk of the storage', withCode('ENOSPC: no space left on device, write', { code: 'ENOSPC', syscall: 'write' }), 'disk_full'],
    ['a full disk of the database, inside the query’s own error', new Error('Failed query', { cause: withCode('could not extend file', { code: '53100' }) }), 'disk_full'],
    ['a database that shuts down', new Error('Failed query', { cause: withCode('terminating connection due to administrator command', { code: '57P01' }) }), 'database'],
    ['a connection that broke', new Error('Failed query', { cause: new Error('Connection terminated unexpectedly') }), 'database'],
    ['a deadlock', new Error('Failed query', { cause: withCode('deadlock detected', { code: '40P01' }) }), 'busy'],
    ['a thread that was ended', new DOMException('The operation was aborted', 'AbortError'), 'thread'],
    ['no memory beside others', new MemoryFault(), 'memory'],
    ['anything else', new TypeError('x is not a function'), 'unknown'],
  ])('%s', (_what, error, code) => {
    expect(passingFaultOf(error)).toMatchObject({ code, message: expect.stringMatching(/^[A-Z].*\.$/) as string });
  });
});
