import { InitialSchema } from './20261201000000InitialSchema';

/** Every migration, in order, explicitly: discovery by folder does not survive bundling. */
export const migrations = [{ name: '20261201000000InitialSchema', class: InitialSchema }];
