import type { StudyFileFault } from './faults';
import { asCount, asDate, asList, asMembers, asText, dateWords, type Members } from './readable';

type Refuse = (pointer: string, detail: string) => void;

/** What the sites' rows have to agree on among themselves and with the cut-off. */
export function siteFaults(file: Members): StudyFileFault[] {
  const faults: StudyFileFault[] = [];
  const refuse: Refuse = (pointer, detail) => faults.push({ pointer, detail });
  const cutoff = asDate(file.dataCutoff);
  const enrolment = asMembers(file.enrolment);
  const seen = new Map<string, number>();
  asList(enrolment.sites).forEach((value, place) => {
    const site = asMembers(value);
    const at = `/enrolment/sites/${place}`;
    const code = asText(site.code);
    if (code !== null) {
      const first = seen.get(code);
      if (first === undefined) seen.set(code, place);
      else
        refuse(`${at}/code`, `Site ${code} is given twice (first at /enrolment/sites/${first}). Give each site once.`);
    }
    openingFaults(site, at, cutoff, refuse);
    recordFaults(site, at, cutoff, refuse);
    if (site.inScreening !== undefined && enrolment.screening === undefined) {
      refuse(
        `${at}/inScreening`,
        'Patients in screening need /enrolment/screening beside them. Give it, or leave this out.',
      );
    }
  });
  onceEach(asList(enrolment.countryRates), '/enrolment/countryRates', refuse);
  onceEach(asList(enrolment.countryCaps), '/enrolment/countryCaps', refuse);
  asList(enrolment.calendar).forEach((value, place) => {
    const entry = asMembers(value);
    const [from, to] = [asDate(entry.from), asDate(entry.to)];
    if (from && to && to < from)
      refuse(
        `/enrolment/calendar/${place}/to`,
        `This lies before its beginning, ${dateWords(from)}. Put it on that day or later.`,
      );
    asList(entry.sites).forEach((site, index) => {
      if (typeof site === 'string' && !seen.has(site))
        refuse(
          `/enrolment/calendar/${place}/sites/${index}`,
          `There is no site ${site} in this file. Name one of its sites.`,
        );
    });
  });
  return faults;
}

function onceEach(rows: unknown[], at: string, refuse: Refuse): void {
  const seen = new Set<string>();
  rows.forEach((value, place) => {
    const country = asText(asMembers(value).country);
    if (country === null) return;
    if (seen.has(country)) refuse(`${at}/${place}/country`, `${country} is given twice. Give each country once.`);
    seen.add(country);
  });
}

function openingFaults(site: Members, at: string, cutoff: string | null, refuse: Refuse): void {
  const activated = asDate(site.activatedOn);
  const closed = asDate(site.closedOn);
  const isActive = site.activatedOn !== undefined && site.activatedOn !== null;
  const isPlanned = site.planned !== undefined && site.planned !== null;
  if (!isActive && !isPlanned)
    refuse(`${at}/activatedOn`, 'Give the day of activation, or a planned window (earliest, likely, latest).');
  if (activated && cutoff && activated > cutoff) {
    refuse(
      `${at}/activatedOn`,
      `This is after the data cut-off, ${dateWords(cutoff)}. A site that is not open by then has a planned window instead.`,
    );
  }
  if (activated && closed && closed < activated)
    refuse(`${at}/closedOn`, `This is before the activation, ${dateWords(activated)}. Put it on that day or later.`);
  if (!isActive && (asCount(site.randomised) ?? 0) > 0)
    refuse(`${at}/randomised`, 'A site that is not active has randomised nobody. Give its activation, or 0.');
  if (!isPlanned) return;
  const window = asMembers(site.planned);
  const [earliest, likely, latest] = [asDate(window.earliest), asDate(window.likely), asDate(window.latest)];
  if (earliest && likely && likely < earliest)
    refuse(`${at}/planned/likely`, `Likely lies before earliest. Put it on or after ${dateWords(earliest)}.`);
  if (likely && latest && latest < likely)
    refuse(`${at}/planned/latest`, `Latest lies before likely. Put it on or after ${dateWords(likely)}.`);
  else if (!likely && earliest && latest && latest < earliest)
    refuse(`${at}/planned/latest`, `Latest lies before earliest. Put it on or after ${dateWords(earliest)}.`);
}

function recordFaults(site: Members, at: string, cutoff: string | null, refuse: Refuse): void {
  const activated = asDate(site.activatedOn);
  const through = asDate(site.loggedThrough);
  if (through && cutoff && through > cutoff)
    refuse(
      `${at}/loggedThrough`,
      `This is after the data cut-off, ${dateWords(cutoff)}. Put it on that day or before.`,
    );
  const lastMonth = cutoff?.slice(0, 7);
  const firstMonth = activated?.slice(0, 7);
  const unlogged = monthsOnce(site.unlogged, `${at}/unlogged`, (value) => asText(value), refuse);
  for (const [month, pointer] of unlogged) {
    if ((lastMonth && month > lastMonth) || (firstMonth && month < firstMonth))
      refuse(pointer, 'The site was not open before the cut-off in this month. Leave it out.');
  }
  const monthly = monthsOnce(site.monthly, `${at}/monthly`, (value) => asText(asMembers(value).month), refuse);
  for (const [month, pointer] of monthly) {
    if ((lastMonth && month > lastMonth) || (firstMonth && month < firstMonth))
      refuse(`${pointer}/month`, 'The site was not open before the cut-off in this month. Leave it out.');
    if (unlogged.has(month))
      refuse(`${pointer}/month`, 'This month is given as not logged too. It is one or the other.');
  }
  if (!Array.isArray(site.monthly)) return;
  const counts = site.monthly.map((value) => asCount(asMembers(value).randomised));
  const randomised = site.randomised === undefined ? 0 : asCount(site.randomised);
  if (randomised === null || counts.some((value) => value === null)) return;
  const total = counts.reduce<number>((sum, value) => sum + (value ?? 0), 0);
  if (total !== randomised)
    refuse(`${at}/randomised`, `The months add up to ${total}, not ${randomised}. Give the same number in both.`);
}

/** Months by name with their pointers; one that is given twice is refused. */
function monthsOnce(
  list: unknown,
  at: string,
  monthOf: (value: unknown) => string | null,
  refuse: Refuse,
): Map<string, string> {
  const found = new Map<string, string>();
  asList(list).forEach((value, place) => {
    const month = monthOf(value);
    if (month === null) return;
    if (found.has(month)) refuse(`${at}/${place}`, `${month} is given twice. Give each month once.`);
    else found.set(month, `${at}/${place}`);
  });
  return found;
}
