/// <reference types="vite/client" />
import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import type { Operation } from '@/lib/http/operation';
import { EXPECTED, NO_OPERATION } from '@/tests/api/role-matrix';
import { createScene, PERSONAS, type RouteHandler, type Scene } from '@/tests/support/scene';

/**
 * Every route over every role and a stranger, on a study of one's own and on another organisation's. What the code says
 * (the operations' own access) is held against a table written by hand; a route that is in neither fails.
 */
const operations = new Map<string, Operation>();
for (const module of Object.values(
  import.meta.glob<Record<string, unknown>>('/lib/*/operations.ts', { eager: true }),
)) {
  for (const value of Object.values(module)) {
    if (isOperation(value)) operations.set(`${value.method} ${value.path}`, value);
  }
}
const routes = import.meta.glob<Record<string, RouteHandler>>('/app/api/**/route.ts', { eager: true });
const METHODS = ['GET', 'POST', 'PUT', 'PATCH', 'DELETE'] as const;

function isOperation(value: unknown): value is Operation {
  return typeof value === 'object' && value !== null && 'access' in value && 'path' in value;
}

const pathOf = (file: string): string =>
  file.replace('/app', '').replace('/route.ts', '').replaceAll('[', '{').replaceAll(']', '}');

const handlers = new Map<string, RouteHandler>();
for (const [file, module] of Object.entries(routes)) {
  for (const method of METHODS) if (module[method]) handlers.set(`${method} ${pathOf(file)}`, module[method]);
}

describe('the table of routes', () => {
  it('holds every route that there is, and no other', () => {
    expect([...handlers.keys()].filter((key) => !NO_OPERATION.includes(key)).sort()).toEqual(
      Object.keys(EXPECTED).sort(),
    );
  });

  it('every route is a declared operation', () => {
    expect([...handlers.keys()].filter((key) => !NO_OPERATION.includes(key) && !operations.has(key))).toEqual([]);
  });

  it('every declared operation is a route', () => {
    expect([...operations.keys()].filter((key) => !handlers.has(key))).toEqual([]);
  });
});

describe('who gets through', () => {
  let scene: Scene;
  beforeAll(async () => {
    scene = await createScene();
  });

  for (const [key, handler] of handlers) {
    const operation = operations.get(key);
    if (!operation) continue;
    const allowed = EXPECTED[key] ?? [];
    // Whatever a path needs besides the study: nothing of that name is there, so an allowed call is refused for that and nothing else.
    const params = {
      month: '2026-03',
      site: '101',
      number: 999_999,
      n: 999_999,
      id: randomUUID(),
      token: 'x'.repeat(32),
    };

    for (const persona of PERSONAS) {
      const may = (allowed as readonly string[]).includes(persona);
      it(`${key}: ${persona} ${may ? 'may' : 'may not'}`, async () => {
        const reply = await scene.call(handler, operation, { as: persona, params });
        const refusal = operation.access.kind !== 'study' ? 403 : persona === 'foreigner' ? 404 : 403;
        if (may) {
          expect([401, 403, 500]).not.toContain(reply.status);
          if (operation.access.kind === 'study' && reply.status === 404)
            expect(reply.json.detail).not.toMatch(/^There is no study/);
        } else {
          expect(reply.status).toBe(persona === 'stranger' ? 401 : refusal);
        }
      });
    }

    if (operation.access.kind === 'study') {
      it(`${key}: another organisation’s study looks like one that is not there`, async () => {
        const [there, nowhere] = await Promise.all(
          [scene.foreignStudyCode, 'NOT-THERE'].map((code) =>
            scene.call(handler, operation, { as: 'statistician', params: { ...params, code } }),
          ),
        );
        expect(there!.status).toBe(404);
        expect(there!.json.detail.replace(scene.foreignStudyCode, '')).toBe(
          nowhere!.json.detail.replace('NOT-THERE', ''),
        );
      });

      it(`${key}: the handler refuses a stranger by itself, whatever headers say`, async () => {
        const reply = await scene.call(handler, operation, {
          as: 'stranger',
          params,
          headers: { 'x-middleware-subrequest': 'proxy:proxy:proxy:proxy:proxy' },
        });
        expect(reply.status).toBe(401);
      });
    }
  }
});
