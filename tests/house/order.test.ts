import { existsSync, readdirSync } from 'node:fs';
import { basename } from 'node:path';
import { describe, expect, it } from 'vitest';
import { read, sourceFiles } from './sources';

/** Rooms of lib/ that are not a domain: they have a vocabulary of their own. */
const NOT_DOMAINS = ['audit', 'auth', 'db', 'email', 'engine', 'exports', 'http', 'jobs', 'openapi', 'study-file'];
const DOMAIN_FILES = ['commands', 'hooks', 'jobs', 'operations', 'queries', 'rules', 'schema', 'serialise'];

const here = 'tests/house/';
const withText = (pattern: RegExp): string[] =>
  sourceFiles.filter((path) => !path.startsWith(here) && pattern.test(read(path)));

describe('the order of the house', () => {
  it('has sources to look at', () => {
    expect(sourceFiles.length).toBeGreaterThan(200);
  });

  it.each([
    ['a check switched off', /eslint-disable|@ts-(ignore|expect-error|nocheck)/],
    ['work left for later', /\b(TODO|FIXME|XXX|HACK)\b/],
    ['a test left out or alone', /\b(it|test|describe)\.(only|skip|todo|fixme)\(/],
    ['an address of a package registry', /registry\.[a-z.]+\.(org|com|io)/],
  ])('stays free of %s', (_what, pattern) => {
    expect(withText(pattern)).toEqual([]);
  });

  it('names files in kebab case, as Next.js and migrations allow', () => {
    const names = sourceFiles.filter((path) => !path.startsWith('migrations/')).map((path) => basename(path));
    expect(names.filter((name) => !/^[a-z0-9]+(-[a-z0-9]+)*(\.[a-z0-9]+)*$/.test(name))).toEqual([]);
  });

  it('has no barrels: the two indexes are lists that the ORM needs', () => {
    const indexes = sourceFiles.filter((path) => /(^|\/)index\.tsx?$/.test(path));
    expect(indexes.sort()).toEqual(['entities/index.ts', 'migrations/index.ts']);
  });

  it('keeps to the vocabulary of a domain folder', () => {
    const domains = readdirSync('lib', { withFileTypes: true })
      .filter((entry) => entry.isDirectory() && !NOT_DOMAINS.includes(entry.name))
      .map(({ name }) => name);
    expect(domains.length).toBeGreaterThan(5);
    const strangers = domains.flatMap((domain) =>
      readdirSync(`lib/${domain}`)
        .filter((file) => !DOMAIN_FILES.includes(file.replace(/\.ts$/, '')))
        .map((file) => `lib/${domain}/${file}`),
    );
    expect(strangers).toEqual([]);
  });

  it('shows every room of lib/ on the map in DEVELOPERS.md', () => {
    const map = read('DEVELOPERS.md').split('```')[1] ?? '';
    const rooms = readdirSync('lib', { withFileTypes: true }).map(({ name }) => name);
    expect(rooms.filter((room) => !map.includes(room))).toEqual([]);
  });

  it('shows no room on the map that is not there', () => {
    const map = read('DEVELOPERS.md').split('```')[1] ?? '';
    let parent = '';
    const missing = map
      .split('\n')
      .filter((line) => /^( {2})?[a-z(]/.test(line))
      .flatMap((line) => {
        const words = line.trim().split(/\s+/);
        const explanation = words.findIndex((word) => !/^[\w()./-]+(\/|\.tsx?)$/.test(word));
        const names = words.slice(0, explanation === -1 ? undefined : explanation);
        if (!line.startsWith(' ')) parent = names[0] ?? '';
        const prefix = line.startsWith(' ') ? parent : '';
        return names.map((name) => `${prefix}${name}`);
      })
      .filter((path) => !existsSync(path));
    expect(missing).toEqual([]);
  });

  it('has nowhere to keep a treatment arm', () => {
    const columns = [...sourceFiles.filter((path) => path.startsWith('entities/') || path.startsWith('migrations/'))]
      .flatMap((path) => read(path).split(/[\n,(]/))
      .map((part) => part.trim().split(/[\s:]/)[0] ?? '');
    expect(columns.length).toBeGreaterThan(100);
    expect(columns.filter((column) => /^(arm|armcd|actarm|treatment|trt)/i.test(column))).toEqual([]);
  });
});
