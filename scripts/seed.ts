import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { calendarDay, systemClock } from '@/lib/clock';
import { addDays, addMonths, lastEndedMonth } from '@/lib/dates';
import { closeOrm, getOrm } from '@/lib/db/orm';
import { env } from '@/lib/env';
import { makeOrganisation, makeOwner, makePerson } from '@/scripts/demo/people';
import { openEmptyStudy, replaySmallStudy } from '@/scripts/demo/studies-small';
import { type DemoCast, replayLargeStudy } from '@/scripts/demo/study-301';

/** Fills an empty database with the demonstration. A database that has people in it is left alone. */
async function seed(): Promise<void> {
  const people = await getOrm().em.fork().execute('select 1 from person limit 1');
  if (people.length > 0) return;
  const now = systemClock.now();
  const lastMonth = lastEndedMonth(calendarDay(now));
  const start = `${addDays(`${addMonths(lastMonth, -13)}-01`, -60)}T08:00:00.000Z`;
  const organisationId = await makeOrganisation('Larkfield Biometrics', start);
  const cast: DemoCast = {
    organisationId,
    statistician: await makePerson('Imke Calloway', 'imke.calloway@larkfield.example', 'statistician', start),
    manager: await makePerson('Tomas Reyl', 'tomas.reyl@larkfield.example', 'manager', start),
    coordinator: await makePerson('Halina Wójt', 'halina.wojt@sites.kalends.example', 'coordinator', start),
    sponsor: await makePerson('Marcus Obanye', 'marcus.obanye@orrin-vale.example', 'sponsor', start),
    owner: await makePerson('Lene Larkfield', 'lene.larkfield@larkfield.example', 'owner', start),
  };
  await makeOwner(organisationId, cast.owner, start);
  const acts =
    (await replayLargeStudy(cast, lastMonth, now.toISOString())) +
    (await replaySmallStudy(cast, lastMonth, now.toISOString()));
  await openEmptyStudy(cast, now.toISOString());
  const accounts = [cast.statistician, cast.manager, cast.coordinator, cast.sponsor, cast.owner].map(
    (person) => person.account,
  );
  writeFileSync(join(env().dataFolder, 'demo-accounts.json'), `${JSON.stringify(accounts, null, 2)}\n`, {
    mode: 0o600,
  });
  process.stdout.write(`The demonstration is in: ${acts} acts of its past replayed\n`);
}

await seed().finally(closeOrm);
