import type { StudyFileFault } from './faults';
import { asList, asMembers, asText, type Members } from './readable';

/** Milestones named twice, parts that are none, circles, and events that no part of the file tells of. */
export function milestoneFaults(file: Members): StudyFileFault[] {
  const faults: StudyFileFault[] = [];
  const refuse = (pointer: string, detail: string): void => void faults.push({ pointer, detail });
  const milestones = asList(file.milestones).map(asMembers);
  const places = new Map<string, number>();
  milestones.forEach((milestone, place) => {
    const code = asText(milestone.code);
    if (code === null) return;
    if (places.has(code))
      refuse(`/milestones/${place}/code`, `Milestone ${code} is given twice. Give each its own code.`);
    else places.set(code, place);
    if (milestone.kind === 'events' && (file.events === undefined || file.events === null)) {
      refuse(
        `/milestones/${place}/kind`,
        'This waits for events, and the file has no events part. Give one, or leave the milestone out.',
      );
    }
  });
  const parts = milestones.map((milestone) => (milestone.kind === 'all-of' ? asList(milestone.of).map(asText) : []));
  parts.forEach((codes, place) => {
    codes.forEach((code, index) => {
      if (code !== null && !places.has(code))
        refuse(
          `/milestones/${place}/of/${index}`,
          `There is no milestone ${code}. Name one of this file’s milestones.`,
        );
    });
    if (leadsBack(place, parts, places))
      refuse(`/milestones/${place}/of`, 'Following its parts leads back to this milestone. Take one of them out.');
  });
  return faults;
}

function leadsBack(start: number, parts: (string | null)[][], places: Map<string, number>): boolean {
  const seen = new Set<number>();
  const open = [start];
  while (open.length > 0) {
    for (const code of parts[open.pop()!]!) {
      const place = code === null ? undefined : places.get(code);
      if (place === start) return true;
      if (place !== undefined && !seen.has(place)) {
        seen.add(place);
        open.push(place);
      }
    }
  }
  return false;
}
