import { act } from '@/scripts/demo/acting';
import type { Actor } from '@/lib/auth/scope';
import { savePlanSection, savePlanVersion } from '@/lib/studies/commands';
import { type Plan, PLAN_SECTIONS, type PlanReason, type SavePlanSectionBody } from '@/lib/studies/schema';

/** Saves a plan as its statistician would: section by section, then as a version. */
export class PlanKeeper {
  readonly #versions = { enrolment: 0, events: 0, milestones: 0, simulation: 0 };
  #plan: Partial<Plan> = {};
  #number = 0;

  constructor(
    private readonly statistician: Actor,
    private readonly code: string,
  ) {}

  async save(
    plan: Plan,
    at: string,
    reasonKind: PlanReason | null = null,
    reason: string | null = null,
  ): Promise<void> {
    for (const section of PLAN_SECTIONS) {
      if (JSON.stringify(this.#plan[section]) === JSON.stringify(plan[section])) continue;
      const body = { section, version: this.#versions[section], value: plan[section] } as SavePlanSectionBody;
      await act(this.statistician, this.code, 'plan:save', at, (scope, context) =>
        savePlanSection(scope, { body }, context),
      );
      this.#versions[section] += 1;
    }
    const body = { baseNumber: this.#number, sectionVersions: { ...this.#versions }, reasonKind, reason };
    await act(this.statistician, this.code, 'plan:save', at, (scope, context) =>
      savePlanVersion(scope, { body }, context),
    );
    this.#plan = plan;
    this.#number += 1;
  }
}
