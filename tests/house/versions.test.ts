import { describe, expect, it } from 'vitest';
import { read } from './sources';

interface Lock {
  packages: Record<string, { version?: string; resolved?: string }>;
}
interface Manifest {
  dependencies: Record<string, string>;
  devDependencies: Record<string, string>;
}

const lock = JSON.parse(read('package-lock.json')) as Lock;
const manifest = JSON.parse(read('package.json')) as Manifest;

const atLeast = (version: string, floor: string): boolean => {
  const parts = (text: string) => (text.split('-')[0] ?? '').split('.').map(Number);
  const [have, want] = [parts(version), parts(floor)];
  for (const [index, number] of want.entries()) {
    if ((have[index] ?? 0) !== number) return (have[index] ?? 0) > number;
  }
  return true;
};

const copiesOf = (name: string): string[] =>
  Object.entries(lock.packages)
    .filter(([path]) => path === `node_modules/${name}` || path.endsWith(`/node_modules/${name}`))
    .map(([, { version = '' }]) => version);

describe('versions', () => {
  it('compares numbers, not letters', () => {
    expect([atLeast('10.6.1', '9.9.9'), atLeast('1.7.3', '1.7.25'), atLeast('6.6.16', '6.6.16')]).toEqual([
      true,
      false,
      true,
    ]);
  });

  // The versions in which published security advisories are mended.
  it.each([
    ['better-auth', '1.7.25'],
    ['next', '16.4.6'],
    ['@mikro-orm/core', '6.6.16'],
    ['@mikro-orm/postgresql', '6.6.16'],
  ])('%s is at least %s, in every copy', (name, floor) => {
    const copies = copiesOf(name);
    expect(copies.length).toBeGreaterThan(0);
    expect(copies.filter((version) => !atLeast(version, floor))).toEqual([]);
  });

  it('nodemailer is at least 10.6.1 where it sends; the local mail server parses with copies of its own', () => {
    expect(atLeast(lock.packages['node_modules/nodemailer']?.version ?? '0', '10.6.1')).toBe(true);
  });

  it('are pinned exactly, and the lock file names no registry', () => {
    const wanted = Object.entries({ ...manifest.dependencies, ...manifest.devDependencies });
    expect(wanted.filter(([, version]) => !/^\d+\.\d+\.\d+$/.test(version))).toEqual([]);
    expect(Object.entries(lock.packages).filter(([, { resolved }]) => resolved?.startsWith('http'))).toEqual([]);
  });

  it('hold no spreadsheet reader with open advisories', () => {
    expect(copiesOf('xlsx')).toEqual([]);
  });
});
