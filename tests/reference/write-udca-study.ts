import { writeFileSync } from 'node:fs';
import { readCsv } from './check-values';
import { buildUdcaStudy, udcaPatients } from './udca-study';

/** Writes `data/udca-study.json` anew from the patients' CSV: `npx tsx tests/reference/write-udca-study.ts`. */
const study = buildUdcaStudy(udcaPatients(readCsv('udca_patients.csv')), '1990-07-01');
writeFileSync(new URL('./data/udca-study.json', import.meta.url), `${JSON.stringify(study, null, 2)}\n`);
