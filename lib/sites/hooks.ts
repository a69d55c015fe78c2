import { useMutation } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import { addSiteOperation, changeSiteOperation } from './operations';
import type { ChangeSiteBody, SiteInput } from './schema';

export function useAddSite(code: string) {
  return useMutation({ mutationFn: (body: SiteInput) => callOperation(addSiteOperation, { params: { code }, body }) });
}

/** `site` is the code that the site had when the form was opened. */
export function useChangeSite(code: string) {
  return useMutation({
    mutationFn: ({ site, body }: { site: string; body: ChangeSiteBody }) =>
      callOperation(changeSiteOperation, { params: { code, site }, body }),
  });
}
