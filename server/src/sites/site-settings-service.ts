import type { SiteSettings, SiteSettingsChange } from '@riseback/contracts';
import { jsonEqual, Limits } from '@riseback/network';
import type { SiteAccess } from '../platform/auth/access';
import { badRequest, notFound } from '../platform/problem';
import { mergePatched } from './merge-patch';
import type { SiteRepository } from './site-repository';

/** What a site's new networks begin with, and how its elements are tagged. Networks hold their own copies: what was solved or signed stays as it was. */
export class SiteSettingsService {
  constructor(
    private readonly sites: SiteRepository,
    private readonly now: () => Date,
  ) {}

  get(access: SiteAccess): SiteSettings {
    return settingsIn(this.sites, access.siteId);
  }

  /** Two people who change different settings at once both have their way. @throws ProblemError 400 a limit that there is not, or out of range */
  change(access: SiteAccess, change: SiteSettingsChange): SiteSettings {
    const { siteId, person } = access;
    return this.sites.transaction((sites) => {
      const before = settingsIn(sites, siteId);
      const after: SiteSettings = {
        atmosphericPressurePa: change.atmosphericPressurePa ?? before.atmosphericPressurePa,
        ambientTemperatureK: change.ambientTemperatureK ?? before.ambientTemperatureK,
        limits: limitsFrom(mergePatched(before.limits, change.limits ?? {})),
        tagPatterns: mergePatched(before.tagPatterns, change.tagPatterns ?? {}),
      };
      if (jsonEqual(before, after)) return before;
      sites.saveSettings(siteId, after);
      sites.audit({
        at: this.now(),
        personId: person.id,
        sessionId: person.sessionId,
        siteId,
        action: 'site.settings',
        subject: siteId,
        details: { ...change },
      });
      return after;
    });
  }
}

function settingsIn(sites: SiteRepository, siteId: string): SiteSettings {
  const settings = sites.settingsOf(siteId);
  if (settings === undefined) throw notFound('There is no such site, or you have no role there.');
  return settings;
}

function limitsFrom(merged: unknown): Limits {
  const read = Limits.safeParse(merged);
  if (read.success) return read.data;
  throw badRequest(
    'Some limits cannot be taken; nothing was changed.',
    read.error.issues.map(({ path, message }) => ({ pointer: `/limits/${path.join('/')}`, detail: message })),
  );
}
