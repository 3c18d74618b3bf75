import { readdirSync, readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';

const built = new URL('../../.build/client/', import.meta.url);
const files = readdirSync(built, { recursive: true, encoding: 'utf8' });

describe('the built client', () => {
  it('loads less than 250 kB of script, gzipped', () => {
    const scripts = files.filter((name) => name.endsWith('.js'));
    expect(scripts.length).toBeGreaterThan(0);
    const bytes = scripts.reduce((sum, name) => sum + gzipSync(readFileSync(new URL(name, built))).length, 0);
    expect(bytes).toBeLessThan(250_000);
  });

  it('loads less than 65 kB of script for the board, gzipped: the pages of accounts come when they are opened', () => {
    const page = readFileSync(new URL('index.html', built), 'utf8');
    const first = [...page.matchAll(/(?:src|href)="\/(assets\/[^"]+\.js)"/g)].map(([, name]) => name ?? '');
    expect(first.length).toBeGreaterThan(0);
    expect(first.reduce((sum, name) => sum + gzipSync(readFileSync(new URL(name, built))).length, 0)).toBeLessThan(65_000);
    for (const name of ['sign-in', 'join', 'display', 'account', 'people', 'displays', 'sources', 'changes']) expect(files.some((file) => file.startsWith(`assets/${name}-page-`)), name).toBe(true);
  });

  it('has no script or style inside the page, and names its files by their content', () => {
    const page = readFileSync(new URL('index.html', built), 'utf8');
    expect(page).not.toMatch(/<script(?![^>]*\ssrc=)/);
    expect(page).not.toMatch(/<style|\sstyle=/);
    for (const [, path] of page.matchAll(/(?:src|href)="([^"]+)"/g)) expect(path).toMatch(/^\/assets\/.+-[\w-]{8}\.(js|css|svg)$/);
  });

  it('asks no other host for anything', () => {
    for (const name of files.filter((one) => /\.(html|css)$/.test(one))) expect(readFileSync(new URL(name, built), 'utf8')).not.toMatch(/(src|href|url\()=?["']?https?:/);
  });
});
