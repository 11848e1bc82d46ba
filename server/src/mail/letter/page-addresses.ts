/** Addresses of pages that mails lead to; the pages' own list is apps/web/src/app/app.routes.ts. */
export function pageAddresses(origin: URL) {
  const page = (...parts: string[]) => `${origin.origin}/${parts.map(encodeURIComponent).join('/')}`;
  const network = ({ siteId, networkId }: NetworkPlace) => ['sites', siteId, 'networks', networkId];
  return {
    account: () => page('account'),
    // In the fragment, which browsers send to no server: no log on the way holds it.
    invitation: (token: string) => `${page('invitation')}#${token}`,
    passwordReset: (token: string) => `${page('password-reset')}#${token}`,
    revision: (place: NetworkPlace & { readonly revisionId: string }) =>
      page(...network(place), 'revisions', place.revisionId),
    comment: ({ revisionId, threadId, ...place }: CommentPlace) => {
      const where =
        revisionId === undefined
          ? page(...network(place), 'comments')
          : page(...network(place), 'revisions', revisionId);
      return threadId === undefined ? where : `${where}?thread=${encodeURIComponent(threadId)}`;
    },
  };
}

interface NetworkPlace {
  readonly siteId: string;
  readonly networkId: string;
}
interface CommentPlace extends NetworkPlace {
  readonly revisionId?: string | undefined;
  readonly threadId?: string | undefined;
}
