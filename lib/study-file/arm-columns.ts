/*
 * Columns that could tell who gets which treatment. The product is blinded by design: a file or a pasted block that has
 * one is refused by name before anything is stored. The names are those of CDISC ADaM and SDTM and the ones that people use.
 */
const ARM_NAMES = new Set([
  'arm', 'armcd', 'armnrs', 'actarm', 'actarmcd', 'actarmud', 'plannedarm', 'actualarm', 'armcode', 'armname', 'studyarm',
  'trt', 'trtp', 'trta', 'trtpn', 'trtan', 'trtcd', 'trtcode', 'trtgrp', 'trtgroup', 'trtseqp', 'trtseqa', 'trtseqpn', 'trtseqan',
  'treatment', 'treatments', 'treatmentarm', 'treatmentcode', 'treatmentgroup', 'treatmentname', 'treatmentallocated', 'treatmentassigned',
  'allocation', 'allocationgroup', 'allocated', 'assignment', 'assignedtreatment', 'randomisedto', 'randomizedto',
  'randomisationarm', 'randomizationarm', 'randomisationgroup', 'randomizationgroup', 'randomisationcode', 'randomizationcode',
  'group', 'studygroup', 'groupcode', 'cohortarm', 'drug', 'studydrug', 'active', 'placebo', 'control', 'experimental', 'kit', 'kitnumber', 'kitno', 'kitid',
  'extrt', 'doselevel', 'dosegroup', 'unblinded', 'unblinding', 'blindcode',
]); // prettier-ignore

/** TRT01P, TRT02AN, TRTSEQP, TR01PG1 and their like. */
const ARM_PATTERNS = [
  /^trt\d+(p|a|pn|an)?$/,
  /^tr\d{2}(p|a)g\d+n?$/,
  /^trtseq/,
  /^actarm/,
  /^arm\d*$/,
  /^treatment\d*$/,
  /^arm(cd|code|name|desc)/,
];

/** Whether a column's name says that it carries the treatment arm, however it is spelt. */
export function isArmColumn(name: string): boolean {
  const plain = name.toLowerCase().replace(/[^a-z0-9]/g, '');
  return ARM_NAMES.has(plain) || ARM_PATTERNS.some((pattern) => pattern.test(plain));
}

export const BLINDING_SENTENCE = 'This product is blinded: no treatment arm is stored, asked for or shown.';

/** Why a file with such a column is refused. `place` counts from 1. */
export function armColumnFault(name: string, place: number): string {
  return `Column ${place}, “${name}”, carries treatment. ${BLINDING_SENTENCE} Send the file without it.`;
}
