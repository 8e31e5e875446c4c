import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { ImportHub, type HubNews, type NewsSource, type Watch } from '@/hooks/import-hub';
import type { ImportDetail } from '@/lib/rules/import-answer';

class FakeSource implements NewsSource {
  readyState = 1;
  onopen: (() => void) | null = null;
  onerror: (() => void) | null = null;
  private readonly hearers = new Map<string, (event: { data: string }) => void>();

  constructor(readonly path: string) {}

  addEventListener(kind: 'import' | 'gone', hear: (event: { data: string }) => void): void {
    this.hearers.set(kind, hear);
  }

  close(): void {
    this.readyState = 2;
  }

  say(kind: 'import' | 'gone', data: object): void {
    this.hearers.get(kind)?.({ data: JSON.stringify(data) });
  }

  break(isForGood: boolean): void {
    this.readyState = isForGood ? 2 : 0;
    this.onerror?.();
  }
}

let sources: FakeSource[];
let hub: ImportHub;
const open = () => sources.filter((source) => source.readyState !== 2);
const watched = (source: FakeSource) => new URL(source.path, 'http://127.0.0.1').searchParams.get('watch');
const settle = () => vi.advanceTimersByTime(100);
const a: Watch = { show: 'quay', id: 'a', mark: '10' };
const b: Watch = { show: 'quay', id: 'b', mark: '20' };
const news = ({ show, id }: Watch, mark: string, state = 'running') => ({ show, id, mark, state, files: [] }) as unknown as ImportDetail;
const heardOf = (hear: ReturnType<typeof vi.fn<(news: HubNews) => void>>) => hear.mock.calls.map(([one]) => one).filter((one) => one.kind !== 'stream');

beforeEach(() => {
  vi.useFakeTimers();
  sources = [];
  hub = new ImportHub((path) => {
    const source = new FakeSource(path);
    sources.push(source);
    return source;
  });
});
afterEach(() => vi.useRealTimers());

describe('one stream', () => {
  test('serves all watchers, however many there are', () => {
    const hears = Array.from({ length: 5 }, () => vi.fn<(news: HubNews) => void>());
    hears.forEach((hear, index) => hub.watch({ index }, index < 3 ? [a] : [a, b], hear));
    settle();
    expect(open().map(watched)).toEqual(['quay/a@10,quay/b@20']);
    open()[0].say('import', news(a, '11'));
    open()[0].say('import', news(b, '21'));
    expect(hears.map((hear) => heardOf(hear).length)).toEqual([1, 1, 1, 2, 2]);
  });

  test('that is opened anew for one more import goes on from what was heard of the first', () => {
    const tab = {};
    hub.watch(tab, [a], vi.fn());
    settle();
    open()[0].say('import', news(a, '15'));
    hub.watch({}, [b], vi.fn());
    settle();
    expect(open().map(watched)).toEqual(['quay/a@15,quay/b@20']);
  });

  test('is told again from where a newcomer is who knows less', () => {
    hub.watch({}, [a], vi.fn());
    settle();
    open()[0].say('import', news(a, '15'));
    hub.watch({}, [{ ...a, mark: '9' }], vi.fn());
    settle();
    expect(open().map(watched)).toEqual(['quay/a@9']);
  });

  test('stays as it is when a watcher says the same again', () => {
    const tab = {};
    hub.watch(tab, [a], vi.fn());
    settle();
    open()[0].say('import', news(a, '15'));
    hub.watch(tab, [{ ...a, mark: '15' }], vi.fn());
    settle();
    expect(sources).toHaveLength(1);
  });

  test('ends with its last watcher, and with its last import', () => {
    const tab = {};
    hub.watch(tab, [a], vi.fn());
    settle();
    hub.watch(tab, [], vi.fn());
    settle();
    expect(open()).toEqual([]);
    hub.watch(tab, [a], vi.fn());
    settle();
    open()[0].say('import', news(a, '30', 'done'));
    settle();
    expect(open()).toEqual([]);
  });

  test('tells who watched it that an import is not theirs any more', () => {
    const hear = vi.fn<(news: HubNews) => void>();
    hub.watch({}, [a, b], hear);
    settle();
    open()[0].say('gone', { show: 'quay', id: 'a' });
    expect(heardOf(hear)).toEqual([{ kind: 'gone', show: 'quay', id: 'a' }]);
    expect(open()).toHaveLength(1);
  });
});

describe('a break', () => {
  test('that the browser mends by itself opens no second stream', () => {
    hub.watch({}, [a], vi.fn());
    settle();
    open()[0].break(false);
    vi.advanceTimersByTime(120_000);
    expect(sources).toHaveLength(1);
  });

  test('for good is tried again, ever less often, from what was heard', () => {
    const hear = vi.fn<(news: HubNews) => void>();
    hub.watch({}, [a], hear);
    settle();
    open()[0].say('import', news(a, '12'));
    const waits: number[] = [];
    for (let round = 0; round < 4; round++) {
      const before = sources.length;
      sources.at(-1)!.break(true);
      let waited = 0;
      for (; sources.length === before; waited += 500) vi.advanceTimersByTime(500);
      waits.push(waited);
    }
    expect(waits).toEqual(waits.toSorted((x, y) => x - y));
    expect(waits.at(-1)!).toBeGreaterThan(waits[0]);
    expect(watched(open()[0])).toBe('quay/a@12');
    expect(hear).toHaveBeenCalledWith({ kind: 'stream', isOpen: false });
    open()[0].onopen?.();
    expect(hear).toHaveBeenLastCalledWith({ kind: 'stream', isOpen: true });
  });
});
