import { z } from 'zod';

/** Building blocks of operations' parameters and replies. */
export const nothing = z.strictObject({});
export const studyParams = z.strictObject({ code: z.string().max(40) });
export const isoDate = z.iso.date('Give a calendar date, for example 2027-03-14.');
export const isoMonth = z.string().regex(/^\d{4}-(0[1-9]|1[0-2])$/, 'Give a month, for example 2027-03.');
export const instant = z.iso.datetime();
export const pageQuery = z.strictObject({
  page: z.coerce.number().int('Give a whole number.').min(1).max(100_000).default(1),
  size: z.coerce.number().int('Give a whole number.').min(1).max(200).default(50),
});
export const paged = <T extends z.ZodType>(item: T) =>
  z.strictObject({ items: z.array(item), page: z.number(), size: z.number(), total: z.number() });
