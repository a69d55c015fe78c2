import type { EntityManager } from '@mikro-orm/postgresql';
import type { CommandContext } from '../audit/record';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import type { UploadedFile } from '../http/operation';
import { type ListedRow, readSiteList, refuseAll, rowFault } from './rules';
import { SHOWN_ROWS, type SitePreview } from './schema';

type ChangeScope = StudyScope<'sites:change'>;

/** What the file would add. Preview and acceptance read it in the same way; only acceptance stores. */
export async function previewSiteList(
  scope: ChangeScope,
  { file }: { file: UploadedFile },
  context: CommandContext,
): Promise<SitePreview> {
  const listed = await checkSiteList(scope, file, context);
  const sites = listed.map(({ site }) => site);
  const open = sites.filter((site) => site.activatedOn !== null).length;
  return {
    fileName: file.name,
    total: sites.length,
    open,
    toOpen: sites.length - open,
    countries: [...new Set(sites.map((site) => site.country))].sort(),
    rows: sites.slice(0, SHOWN_ROWS),
  };
}

/** The rows of a list none of whose sites is in the study yet. */
export async function checkSiteList(
  scope: ChangeScope,
  file: UploadedFile,
  { em, clock }: CommandContext,
): Promise<ListedRow[]> {
  const listed = readSiteList(file.bytes, calendarDay(clock.now()));
  const present = await codesOf(scope, em);
  refuseAll(
    listed
      .filter(({ site }) => present.has(site.code.toLowerCase()))
      .map(({ row, site }) =>
        rowFault(row, 'code', `${site.code} is in this study already. Leave the row out; change the site on its own.`),
      ),
  );
  return listed;
}

async function codesOf(scope: ChangeScope, em: EntityManager): Promise<Set<string>> {
  const rows = await em.execute<{ code: string }[]>(
    `select lower(code) as code from site where organisation_id = ? and study_id = ?`,
    [scope.organisationId, scope.studyId],
  );
  return new Set(rows.map((row) => row.code));
}
