import { describe, expect, it } from 'vitest';
import { mostUploads, SourceUploads } from '../../../core/monitor/source-uploads.ts';

describe('what is remembered of uploads', () => {
  it('is the newest thousand keys', () => {
    const uploads = new SourceUploads();
    for (let i = 0; i <= mostUploads; i += 1) uploads.begin(`k${i}`, 'm', 1 + i);
    expect(uploads.of('k0')).toBeUndefined();
    expect(uploads.of('k1')).toEqual({ key: 'k1', mark: 'm', first: 2, next: 3 });
    const copy = new SourceUploads();
    copy.restore(uploads.snapshot());
    expect(copy.snapshot()).toEqual(uploads.snapshot());
    expect(copy.running).toBe(`k${mostUploads}`);
  });
});
