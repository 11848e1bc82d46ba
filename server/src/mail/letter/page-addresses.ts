interface NetworkPlace {
  readonly siteId: string;
  readonly networkId: string;
}
interface CommentPlace extends NetworkPlace {
  readonly revisionId?: string | undefined;
  readonly elementId?: string | undefined;
}

/** What the page of revisions calls the network as it stands. */
const WORKING = 'working';

/** Addresses of pages that mails lead to; the pages' own list is apps/web/src/app/app.routes.ts. */
export function pageAddresses(origin: URL) {
  const page = (...parts: string[]) => `${origin.origin}/${parts.map(encodeURIComponent).join('/')}`;
  const ofNetwork = ({ siteId, networkId }: NetworkPlace, view: string, query: string, value: string) =>
    `${page('sites', siteId, 'networks', networkId, view)}?${query}=${encodeURIComponent(value)}`;
  return {
    account: () => page('account'),
    // In the fragment, which browsers send to no server: no log on the way holds it.
    invitation: (token: string) => `${page('invitation')}#${token}`,
    passwordReset: (token: string) => `${page('password-reset')}#${token}`,
    revision: (place: NetworkPlace & { readonly revisionId: string }) =>
      ofNetwork(place, 'revisions', 'revision', place.revisionId),
    /** Where the comment is read: beside its revision, else at its element, else beside the network as it stands. */
    comment: (place: CommentPlace) => {
      if (place.revisionId !== undefined) return ofNetwork(place, 'revisions', 'revision', place.revisionId);
      if (place.elementId !== undefined) return ofNetwork(place, 'drawing', 'element', place.elementId);
      return ofNetwork(place, 'revisions', 'revision', WORKING);
    },
  };
}
