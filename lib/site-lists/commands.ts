import { createHash, randomUUID } from 'node:crypto';
import { type CommandContext, recordAudit } from '../audit/record';
import type { StudyScope } from '../auth/scope';
import type { UploadedFile } from '../http/operation';
import { Site } from '../../entities/site';
import { checkSiteList } from './queries';

/** Adds every site of the list in one transaction, and one row to the trail that holds them all. */
export async function acceptSiteList(
  scope: StudyScope<'sites:change'>,
  { file }: { file: UploadedFile },
  context: CommandContext,
): Promise<{ added: number }> {
  const { em, clock } = context;
  const listed = await checkSiteList(scope, file, context);
  const key = { organisationId: scope.organisationId, studyId: scope.studyId, createdAt: clock.now() };
  await em.insertMany(
    Site,
    listed.map(({ site }) => ({ id: randomUUID(), ...key, ...site, version: 1 })),
  );
  const sha256 = createHash('sha256').update(file.bytes).digest('hex');
  await recordAudit(context, scope, {
    action: 'sites:add-list',
    recordType: 'site-list',
    recordId: file.name,
    changes: [
      { field: 'sha256', old: null, new: sha256 },
      ...listed.map(({ site: { code, ...rest } }) => ({ field: `site ${code}`, old: null, new: rest })),
    ],
  });
  return { added: listed.length };
}
