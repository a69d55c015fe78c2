import type { StudyFileFault } from './faults';
import { asCount, asDate, asList, asMembers, asText, dateWords, type Members } from './readable';

type Refuse = (pointer: string, detail: string) => void;

/** What subjects, sites and the model have to agree on. */
export function eventFaults(file: Members): StudyFileFault[] {
  const faults: StudyFileFault[] = [];
  const refuse: Refuse = (pointer, detail) => faults.push({ pointer, detail });
  if (file.events === undefined || file.events === null) return faults;
  const events = asMembers(file.events);
  const model = asMembers(events.model);
  const usesData = model.basis === 'data' || asMembers(events.dropout).basis === 'data';
  const [hasSubjects, hasAggregate] = [events.subjects !== undefined, events.aggregate !== undefined];
  if (hasSubjects && hasAggregate)
    refuse('/events/aggregate', 'Give subjects or aggregate, not both: they would count the same patients twice.');
  if (!hasSubjects && !hasAggregate && usesData)
    refuse('/events/subjects', 'Basis “data” needs data. Give subjects, or aggregate in place of it, or basis “plan”.');
  cutsFaults(model, refuse);
  if (hasSubjects) subjectFaults(file, asList(events.subjects), refuse);
  if (hasAggregate) aggregateFaults(file, asMembers(events.aggregate), refuse);
  return faults;
}

function cutsFaults(model: Members, refuse: Refuse): void {
  const isPiecewise = model.family === 'piecewise-exponential';
  if (isPiecewise && model.cutsMonths === undefined)
    refuse('/events/model/cutsMonths', 'A piecewise exponential needs its cuts, in months, for example [6, 12].');
  if (!isPiecewise && model.cutsMonths !== undefined && model.family !== 'average') {
    refuse('/events/model/cutsMonths', 'Only a piecewise exponential has cuts. Leave them out, or choose that family.');
  }
  asList(model.cutsMonths).forEach((cut, place, cuts) => {
    const before = cuts[place - 1];
    if (typeof cut === 'number' && typeof before === 'number' && cut <= before)
      refuse(`/events/model/cutsMonths/${place}`, `Cuts rise. Give a number above ${before}.`);
  });
}

function subjectFaults(file: Members, subjects: unknown[], refuse: Refuse): void {
  const cutoff = asDate(file.dataCutoff);
  const sites = asList(asMembers(file.enrolment).sites).map(asMembers);
  const places = new Map(sites.map((site, place) => [asText(site.code), place]));
  const listed = new Int32Array(sites.length);
  const seen = new Map<string, number>();
  let everySiteKnown = true;
  subjects.forEach((value, place) => {
    const subject = asMembers(value);
    const at = `/events/subjects/${place}`;
    const id = asText(subject.id);
    if (id !== null) {
      const first = seen.get(id);
      if (first === undefined) seen.set(id, place);
      else
        refuse(
          `${at}/id`,
          `Subject ${id} is given twice (first at /events/subjects/${first}). Give each subject once.`,
        );
    }
    const siteCode = asText(subject.site);
    const sitePlace = places.get(siteCode);
    if (siteCode === null) everySiteKnown = false;
    else if (sitePlace === undefined) {
      everySiteKnown = false;
      refuse(`${at}/site`, `There is no site ${siteCode} in this file. Name one of its sites.`);
    } else {
      listed[sitePlace]! += 1;
      siteDateFaults(subject, sites[sitePlace]!, at, refuse);
    }
    dateFaults(subject, at, cutoff, refuse);
  });
  if (everySiteKnown && subjects.length > 0) {
    sites.forEach((site, place) => {
      const randomised = site.randomised === undefined ? 0 : asCount(site.randomised);
      if (randomised !== null && randomised !== listed[place]) {
        refuse(
          `/enrolment/sites/${place}/randomised`,
          `The subjects of site ${String(site.code)} are ${listed[place]}, not ${randomised}. Give the same number in both.`,
        );
      }
    });
  }
}

function siteDateFaults(subject: Members, site: Members, at: string, refuse: Refuse): void {
  const [randomised, activated] = [asDate(subject.randomisedOn), asDate(site.activatedOn)];
  if (randomised && activated && randomised < activated) {
    refuse(
      `${at}/randomisedOn`,
      `Site ${String(site.code)} opened on ${dateWords(activated)}. Put the randomisation on that day or later, or correct the activation.`,
    );
  }
}

function dateFaults(subject: Members, at: string, cutoff: string | null, refuse: Refuse): void {
  const [randomised, status] = [asDate(subject.randomisedOn), asDate(subject.statusOn)];
  if (randomised && cutoff && randomised > cutoff)
    refuse(
      `${at}/randomisedOn`,
      `This is after the data cut-off, ${dateWords(cutoff)}. Leave the subject out, or move the cut-off.`,
    );
  if (status && cutoff && status > cutoff)
    refuse(
      `${at}/statusOn`,
      `This is after the data cut-off, ${dateWords(cutoff)}. Give the status as known on that day.`,
    );
  if (randomised && status && status < randomised)
    refuse(
      `${at}/statusOn`,
      `This is before the randomisation, ${dateWords(randomised)}. Put it on that day or later.`,
    );
}

function aggregateFaults(file: Members, aggregate: Members, refuse: Refuse): void {
  const counts = ['events', 'withdrawn', 'atRisk'].map((name) => asCount(aggregate[name]));
  const perSite = asList(asMembers(file.enrolment).sites).map((site) => {
    const { randomised } = asMembers(site);
    return randomised === undefined ? 0 : asCount(randomised);
  });
  if (counts.includes(null) || perSite.includes(null)) return;
  const total = counts.reduce<number>((sum, value) => sum + (value ?? 0), 0);
  const randomised = perSite.reduce<number>((sum, value) => sum + (value ?? 0), 0);
  if (total > randomised)
    refuse(
      '/events/aggregate/atRisk',
      `Events, withdrawn and at risk add up to ${total}, more than the ${randomised} randomised. Correct one of them.`,
    );
}
