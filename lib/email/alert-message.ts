import type { EntityManager } from '@mikro-orm/postgresql';
import { createElement, type ReactElement } from 'react';
import { Organisation } from '../../entities/organisation';
import { Person } from '../../entities/person';
import { Publication, type PublicationRow } from '../../entities/publication';
import { getSpokenAlert } from '../alerts/queries';
import { conditionWords } from '../alerts/rules';
import type { AlertContent } from '../alerts/schema';
import type { MilestoneForecast } from '../engine/types';
import { env } from '../env';
import { formatDaysMoved } from '../format';
import { medianMoved, milestoneWords, nameOfMilestone, waitsFor } from '../publications/rules';
import { mailBrackets } from './templates/alert-brackets';
import { AlertMail, type AlertMailProps } from './templates/alert-mail';

/** An alert as it was spoken: everything in it is immutable, so every attempt sends the same message. */
export async function alertMessage(
  em: EntityManager,
  key: { organisationId: string; alertId: string },
): Promise<ReactElement> {
  const { organisationId } = key;
  const { content, publicationId } = await getSpokenAlert(em, key);
  const publication = await em.findOneOrFail(Publication, { organisationId, id: publicationId });
  const before = await em.findOne(
    Publication,
    { organisationId, studyId: publication.studyId, number: { $lt: publication.number } },
    { orderBy: { number: 'desc' } },
  );
  const organisation = await em.findOneOrFail(Organisation, { id: organisationId });
  const publisher = await em.findOne(Person, { id: publication.publishedBy });
  return createElement(
    AlertMail,
    alertMailProps(content, {
      publication,
      before,
      publishedBy: publisher?.name ?? 'The study’s statistician',
      isDemonstration: organisation.isDemonstration,
    }),
  );
}

type Published = Pick<PublicationRow, 'number' | 'note' | 'content' | 'publishedAt'>;

interface Around {
  publication: Published;
  before: Published | null;
  publishedBy: string;
  isDemonstration: boolean;
}

export function alertMailProps(alert: AlertContent, around: Around): AlertMailProps {
  const { publication, before } = around;
  const { study, milestones, cautions, dataCutoff } = publication.content;
  const milestone = milestones.find(({ code }) => code === alert.milestoneCode)!;
  const earlier = before?.content.milestones.find(({ code }) => code === alert.milestoneCode) ?? null;
  const publishedOn = dayOf(publication);
  return {
    study,
    publication: {
      number: publication.number,
      publishedOn,
      dataCutoff,
      note: publication.note,
      publishedBy: around.publishedBy,
    },
    news: alert.condition.kind === 'nears' ? alert.headline : null,
    milestone: {
      name: nameOfMilestone(milestone),
      waitsFor: `${milestone.count === undefined ? '' : 'the '}${waitsFor(milestone, milestones)}`,
      kind: milestone.kind,
      words: milestoneWords(milestone),
    },
    moved: before && earlier && movedAgainst(before.number, earlier, milestone),
    brackets: mailBrackets(
      { publishedOn, milestone },
      before && earlier && { publishedOn: dayOf(before), milestone: earlier },
    ),
    cautions: cautions
      .filter((caution) => caution.milestones.length === 0 || caution.milestones.includes(alert.milestoneCode))
      .map((caution) => caution.text),
    rule: conditionWords(alert.condition, alert.milestoneName),
    url: `${env().origin}/studies/${encodeURIComponent(study.code)}/timeline`,
    isDemonstration: around.isDemonstration,
  };
}

const dayOf = ({ publishedAt }: Published): string => publishedAt.toISOString().slice(0, 10);

function movedAgainst(number: number, earlier: MilestoneForecast, now: MilestoneForecast): AlertMailProps['moved'] {
  const days = medianMoved(earlier, now);
  if (days === null) return null;
  const { range, exact } = milestoneWords(earlier);
  const median = /median [^;]+/.exec(exact)?.[0];
  const was = `(${[range, median].filter(Boolean).join(', ')})`;
  if (days === 0) return { lead: 'Unchanged', rest: `since publication ${number} ${was}.` };
  return { lead: formatDaysMoved(days), rest: `than in publication ${number} ${was}.` };
}
