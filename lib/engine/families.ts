import { exponentialFamily } from './family-exponential';
import { weibullFamily } from './family-weibull';
import type { SurvivalFamily } from './survival-family';
import type { Family } from './types';

/** The families that the engine has, by their names in the study file. */
const FAMILIES: readonly SurvivalFamily[] = [exponentialFamily, weibullFamily];

export const FAMILY_NAMES: readonly string[] = FAMILIES.map(({ name }) => name);

/** @throws RangeError for a family that the engine does not have (`unsupportedParts` refuses it before) */
export function getFamily(name: Family): SurvivalFamily {
  const family = FAMILIES.find((candidate) => candidate.name === name);
  if (!family) throw new RangeError(`The family “${name}” is not supported.`);
  return family;
}
