import { expect, it } from 'vitest';
import { POST as acceptRoute } from '@/app/api/v1/studies/[code]/sites/list/accept/route';
import { acceptSiteListOperation } from '@/lib/site-lists/operations';
import { createScene } from '@/tests/support/scene';

it('a list of five thousand sites is added in one go', async () => {
  const scene = await createScene();
  const head = 'code,name,city,country,earliest,likely,latest';
  const rows = Array.from(
    { length: 5000 },
    (_, place) => `S${place},Clinic ${place},Leith,GB,2027-05-01,2027-05-31,2027-08-29`,
  );
  const file = { name: 'all.csv', text: [head, ...rows].join('\n') };
  const accepted = await scene.call(acceptRoute, acceptSiteListOperation, { as: 'manager', file });
  expect(accepted.json).toEqual({ added: 5000 });
});
