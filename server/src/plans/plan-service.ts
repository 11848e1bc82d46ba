import {
  type ImageType,
  type NetworkPlan,
  type Plan,
  PLAN_LIMITS,
  type PlanPlacement,
  type PlanUpload,
  type StalePlan,
} from '@riseback/contracts';
import { acceptedImage } from '../files/accepted-image';
import type { NetworkAccess } from '../platform/auth/access';
import { notFound, staleVersion } from '../platform/problem';
import type { PlanRepository } from './plan-repository';

/** Whoever has the network open is told that its plan has changed. */
export interface PlanListener {
  planChanged(networkId: string, version: number): void;
}

const NEW_PLACEMENT = { x: 0, y: 0, unitsPerPixel: 1, opacity: 0.5 } as const;
const UNNAMED = 'Plan';
const WORDS = { what: 'A plan', advice: 'Send a PNG or a JPEG; of a PDF, a page drawn as one of these.' } as const;

/** The plan under a network's drawing: one image, and where it lies. It is none of the network's edits and moves no element. */
export class PlanService {
  constructor(
    private readonly plans: PlanRepository,
    private readonly listener: PlanListener,
    private readonly newId: () => string,
    private readonly now: () => Date,
  ) {}

  get(access: NetworkAccess): NetworkPlan {
    return this.plans.of(access.networkId);
  }

  /** @throws ProblemError 404 when that is not the file of this network's plan */
  image(access: NetworkAccess, fileId: string): { readonly mediaType: ImageType; readonly content: Buffer } {
    const { plan } = this.plans.of(access.networkId);
    const file = plan?.fileId === fileId ? this.plans.files.content(access.siteId, fileId) : undefined;
    if (file === undefined) throw notFound('There is no such image under this drawing; the plan may have changed.');
    return file;
  }

  /**
   * Puts an image under the drawing, in the place of the one before.
   * @throws ProblemError 412 not made on the newest version; 413 too many bytes; 415 another kind of file, or not the kind that it was said to be;
   *   422 not whole, or too many pixels
   */
  upload(
    access: NetworkAccess,
    onVersion: number,
    sent: { readonly bytes: Uint8Array; readonly declared: string } & PlanUpload,
  ): NetworkPlan {
    const { mediaType, widthPx, heightPx, content } = acceptedImage(sent, PLAN_LIMITS, WORDS);
    return this.change(access, onVersion, (plans, version, before) => {
      const id = this.newId();
      const name = sent.name ?? UNNAMED;
      const { siteId, networkId, person } = access;
      const createdAt = this.now().toISOString();
      const purpose = 'plan' as const;
      const sha256 = plans.files.insert({
        id,
        siteId,
        purpose,
        name,
        mediaType,
        content,
        createdBy: person.id,
        createdAt,
      });
      const placement = before === undefined ? NEW_PLACEMENT : placementOf(before);
      const { x = placement.x, y = placement.y, unitsPerPixel = placement.unitsPerPixel } = sent;
      plans.save(networkId, version, { ...placement, x, y, unitsPerPixel, fileId: id, widthPx, heightPx });
      if (before !== undefined) plans.files.delete(before.fileId);
      return {
        action: 'plan.upload',
        details: { name, mediaType, widthPx, heightPx, sizeBytes: content.length, sha256 },
      };
    });
  }

  /** @throws ProblemError 404 there is no plan; 412 not made on the newest version */
  place(access: NetworkAccess, onVersion: number, placement: PlanPlacement): NetworkPlan {
    return this.change(access, onVersion, (plans, version, before) => {
      if (before === undefined) throw noPlan();
      const { fileId, widthPx, heightPx } = before;
      plans.save(access.networkId, version, { ...placement, fileId, widthPx, heightPx });
      return { action: 'plan.place', details: { ...placement } };
    });
  }

  /** Takes the plan away with its image. @throws ProblemError as `place` */
  remove(access: NetworkAccess, onVersion: number): NetworkPlan {
    return this.change(access, onVersion, (plans, version, before) => {
      if (before === undefined) throw noPlan();
      const { widthPx, heightPx, fileId, name } = before;
      plans.save(access.networkId, version, { ...placementOf(before), widthPx, heightPx });
      plans.files.delete(fileId);
      return { action: 'plan.remove', details: { name } };
    });
  }

  private change(
    access: NetworkAccess,
    onVersion: number,
    make: (
      plans: PlanRepository,
      version: number,
      before: Plan | undefined,
    ) => { readonly action: string; readonly details: Readonly<Record<string, unknown>> },
  ): NetworkPlan {
    const { networkId, siteId, person } = access;
    const changed = this.plans.transaction((plans) => {
      const current = plans.of(networkId);
      if (current.version !== onVersion) throw stale(current, onVersion);
      const { action, details } = make(plans, current.version + 1, current.plan);
      plans.audit({
        at: this.now(),
        personId: person.id,
        sessionId: person.sessionId,
        siteId,
        action,
        subject: networkId,
        details,
      });
      return plans.of(networkId);
    });
    this.listener.planChanged(networkId, changed.version);
    return changed;
  }
}

function placementOf({ x, y, unitsPerPixel, metresPerUnit, opacity }: PlanPlacement): PlanPlacement {
  return { x, y, unitsPerPixel, opacity, ...(metresPerUnit === undefined ? {} : { metresPerUnit }) };
}

function noPlan(): Error {
  return notFound('There is no plan under this drawing.');
}

function stale(current: NetworkPlan, onVersion: number): Error {
  return staleVersion(
    `The plan is at version ${current.version}; this change was made on version ${onVersion}. Look at it as it is now, then change it again.`,
    { currentVersion: current.version, current } satisfies StalePlan,
  );
}
