'use client';

import { toNestErrors } from '@hookform/resolvers';
import { useEffect, useMemo, useState } from 'react';
import {
  type DefaultValues,
  type FieldError,
  type FieldPath,
  type FieldValues,
  type Resolver,
  useForm,
  type UseFormReturn,
  useWatch,
} from 'react-hook-form';
import { keep, keptKey, type KeptTyping, readKept } from '@/components/studies/kept-typing';
import { ProblemError } from '@/lib/http/client';
import { useSavePlanSection } from '@/lib/studies/hooks';
import { sameValue } from '@/lib/studies/rules';
import {
  type PlanSection,
  type PlanView,
  type SavedSection,
  savedSectionSchema,
  SECTION_SCHEMAS,
  type SavePlanSectionBody,
} from '@/lib/studies/schema';

/** How a section of the plan becomes fields and back. */
export interface SectionCodec<Typed extends FieldValues> {
  section: PlanSection;
  typedOf: (value: unknown, isSaved: boolean) => Typed;
  valueOf: (typed: Typed, saved: unknown) => unknown;
  /** The field of a fault, from the path in the section's value. */
  fieldOf: (path: string) => string;
  /** Where the schema speaks of shares and the field of per cent. */
  wordsOf?: (path: string) => string | undefined;
}

export interface SectionFault {
  field: string;
  message: string;
}

export interface PlanSectionForm<Typed extends FieldValues> {
  form: UseFormReturn<Typed>;
  isSaved: boolean;
  /** Typed and not saved. */
  isChanged: boolean;
  /** What stands on the server, as far as this page knows, and how often it was saved. */
  savedValue: unknown;
  version: number;
  /** What the fields say now; undefined while something in them is wrong. */
  value: unknown;
  faults: SectionFault[];
  /** Faults are shown once a field was left or a save was tried. */
  shownFaults: SectionFault[];
  errorOf: (field: string) => string | undefined;
  conflict: SavedSection | null;
  failure: string | null;
  isSaving: boolean;
  kept: KeptTyping | null;
  takeUpKept: () => void;
  dropKept: () => void;
  /** Leaves what was typed and shows what stands. */
  takeBack: () => void;
  takeTheirs: () => void;
  keepMine: () => Promise<SavedSection | null>;
  /** Shows every fault; true where there is none. */
  check: (shouldFocus: boolean) => Promise<boolean>;
  /** What stands after the save; null where it was refused. */
  save: () => Promise<SavedSection | null>;
}

function faultsOf<Typed extends FieldValues>(codec: SectionCodec<Typed>, value: unknown): SectionFault[] {
  const parsed = SECTION_SCHEMAS[codec.section].safeParse(value);
  if (parsed.success) return [];
  const byField = new Map<string, string>();
  for (const issue of parsed.error.issues) {
    const path = issue.path.map(String).join('.');
    const field = codec.fieldOf(path);
    if (!byField.has(field)) byField.set(field, codec.wordsOf?.(path) ?? issue.message);
  }
  return [...byField].map(([field, message]) => ({ field, message }));
}

interface Base {
  version: number;
  value: unknown;
  isSaved: boolean;
}

interface Where {
  plan: PlanView;
  personId: string;
  /** False while the page is still the server's, which knows nothing of this device. */
  onDevice: boolean;
}

/** One section of the plan as a form of its own: it saves alone, keeps its typing, and shows both values when someone was faster. */
export function usePlanSection<Typed extends FieldValues>(
  codec: SectionCodec<Typed>,
  { plan, personId, onDevice }: Where,
): PlanSectionForm<Typed> {
  const { section } = codec;
  const saved = plan.sections[section];
  const isSaved = plan.saved.includes(section);
  const [base, setBase] = useState<Base>({ version: saved.version, value: saved.value ?? null, isSaved });
  const [basedOn, setBasedOn] = useState<number | null>(null);
  const [conflict, setConflict] = useState<SavedSection | null>(null);
  const [failure, setFailure] = useState<string | null>(null);
  const [tried, setTried] = useState(false);
  const [refused, setRefused] = useState<readonly SectionFault[]>([]);
  const sending = useSavePlanSection(plan.study.code);

  const resolver: Resolver<Typed> = (typed, _context, options) => {
    const found = faultsOf(codec, codec.valueOf(typed, base.value));
    if (found.length === 0) return { values: typed, errors: {} };
    const errors = Object.fromEntries(
      found.map((fault) => [fault.field, { type: 'refused', message: fault.message } satisfies FieldError]),
    );
    return { values: {}, errors: toNestErrors(errors, options) };
  };
  const standing = useMemo(() => codec.typedOf(base.value, base.isSaved), [codec, base]);
  const form = useForm<Typed>({ resolver, defaultValues: standing as DefaultValues<Typed> });
  const typed = useWatch({ control: form.control }) as Typed;
  const value = codec.valueOf(typed, base.value);
  const faults = faultsOf(codec, value);
  const isChanged = JSON.stringify(typed) !== JSON.stringify(standing);

  // Somebody else's save takes the fields over only while nothing is being typed in them.
  if (saved.version > base.version && !isChanged) {
    setBase({ version: saved.version, value: saved.value ?? null, isSaved });
  }
  useEffect(() => form.reset(standing), [form, standing]);

  const key = keptKey(personId, plan.study.code, section);
  const [kept, setKept] = useState<KeptTyping | null>(() => (onDevice ? readKept(key, standing) : null));
  useEffect(() => {
    if (!onDevice || !isChanged) return;
    const timer = setTimeout(
      () => keep(key, { typed, version: basedOn ?? base.version, keptAt: new Date().toISOString() }),
      300,
    );
    return () => clearTimeout(timer);
  }, [key, onDevice, typed, isChanged, basedOn, base.version]);

  const settle = (now: SavedSection): void => {
    setBase({ version: now.version, value: now.value ?? null, isSaved: true });
    setBasedOn(null);
    setConflict(null);
    setFailure(null);
    setTried(false);
    setRefused([]);
    setKept(null);
    keep(key, null);
  };

  const refuse = (error: Error, wished: unknown): SavedSection | null => {
    const problem = error instanceof ProblemError ? error.problem : null;
    const theirs = savedSectionSchema.safeParse(problem?.current);
    if (problem?.status === 409 && theirs.success) {
      const same = sameValue(theirs.data.value, wished);
      if (same) settle(theirs.data);
      else setConflict(theirs.data);
      return same ? theirs.data : null;
    }
    setRefused(
      (problem?.errors ?? []).map(({ pointer, detail }) => ({
        field: codec.fieldOf(pointer.split('/').slice(2).join('.')),
        message: detail,
      })),
    );
    setFailure(problem?.errors ? null : error.message);
    return null;
  };

  const check = async (shouldFocus: boolean): Promise<boolean> => {
    setTried(true);
    return form.trigger(undefined, { shouldFocus });
  };

  const send = async (version: number): Promise<SavedSection | null> => {
    setFailure(null);
    setRefused([]);
    if (!(await check(true))) return null;
    const wished = codec.valueOf(form.getValues(), base.value);
    try {
      const now = await sending.mutateAsync({ section, version, value: wished } as SavePlanSectionBody);
      settle(now);
      return now;
    } catch (error) {
      return refuse(error as Error, wished);
    }
  };

  const isTouched = (fault: SectionFault): boolean =>
    form.getFieldState(fault.field as FieldPath<Typed>, form.formState).isTouched;

  const shownFaults = [...(tried ? faults : faults.filter(isTouched)), ...refused];

  return {
    form,
    isSaved: base.isSaved,
    isChanged,
    savedValue: base.value,
    version: base.version,
    value: faults.length === 0 ? value : undefined,
    faults,
    shownFaults,
    errorOf: (field) => shownFaults.find((fault) => fault.field === field)?.message,
    conflict,
    failure,
    isSaving: sending.isPending,
    kept,
    takeUpKept: () => {
      if (!kept) return;
      setBasedOn(kept.version);
      form.reset(kept.typed as Typed, { keepDefaultValues: true });
      setKept(null);
      setTried(true);
      void form.trigger();
    },
    dropKept: () => {
      keep(key, null);
      setKept(null);
    },
    takeBack: () => {
      keep(key, null);
      setTried(false);
      setBasedOn(null);
      setConflict(null);
      form.reset(standing);
    },
    takeTheirs: () => conflict && settle(conflict),
    keepMine: () => (conflict ? send(conflict.version) : Promise.resolve(null)),
    check,
    save: () => send(basedOn ?? base.version),
  };
}
