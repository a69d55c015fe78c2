import { redirect } from 'next/navigation';
import { NoPermission } from '@/components/shell/no-permission';
import { readStudy } from '@/lib/http/page';
import { findFrontDoor } from '@/lib/studies/queries';

/** A study's front door leads each role to where its work begins. */
export default async function StudyPage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params;
  const read = await readStudy(code, 'study:read', findFrontDoor);
  if (!read.permitted) return <NoPermission detail={read.detail} />;
  redirect(`/studies/${encodeURIComponent(code)}/${read.data}`);
}
