import type { Permission } from '@riseback/contracts';
import type { Request, Response } from 'express';
import type * as z from 'zod';
import type { NetworkAccess, PersonAccess, SiteAccess } from '../auth/access';
import type { UploadedBytes } from '../http/read-json-body';

export type HttpMethod = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** Who may pass; a list of permissions is satisfied by any one of them. */
export type RouteRule =
  | { readonly kind: 'public' }
  | { readonly kind: 'signedIn' }
  | { readonly kind: 'site'; readonly anyOf: readonly Permission[] }
  | { readonly kind: 'network'; readonly anyOf: readonly Permission[] };

export const BODY_LIMIT_BYTES = 1024 * 1024;
/** A file of 10,000 pipes, about: to read it and check it takes some 150 ms, which is as long as other requests may be kept waiting. */
export const NETWORK_FILE_LIMIT_BYTES = 2 * 1024 * 1024;
/** Read and checked in the solver's thread: some 30,000 pipes. */
export const SOLVED_FILE_LIMIT_BYTES = 8 * 1024 * 1024;

/** The answers of a route other than problems: a schema, or words for one that carries no JSON. */
export type Answers = Readonly<Record<number, z.ZodType | string>>;

/** What a route takes instead of JSON: one file as it is, of one of the types. */
export interface UploadRule {
  readonly types: readonly string[];
  readonly limitBytes: number;
}

export interface HandlerContext<Access, Params, Query, Body> {
  readonly access: Access;
  readonly params: Params;
  readonly query: Query;
  readonly body: Body;
  /** Empty where the route takes none. */
  readonly upload: UploadedBytes;
  readonly req: Request;
  readonly res: Response;
}

interface RouteDefinition<
  Path extends string,
  Access,
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
> {
  readonly method: HttpMethod;
  /** Express path, such as `/api/sites/:siteId/networks`. */
  readonly path: Path;
  /** One line for the API description. */
  readonly summary: string;
  /** Path parameters beyond :siteId and :networkId, which the access value carries. */
  readonly params?: Params;
  readonly query?: Query;
  readonly body?: Body;
  /** Instead of `body`. */
  readonly upload?: UploadRule;
  readonly answers: Answers;
  /** Default 1 MB. */
  readonly bodyLimitBytes?: number;
  /** `bytes`: the handler gets the JSON unread, to have it read in another thread. */
  readonly bodyAs?: 'json' | 'bytes';
  readonly handler: (
    context: HandlerContext<Access, z.output<Params>, z.output<Query>, z.output<Body>>,
  ) => void | Promise<void>;
}

type Permitted = { readonly permission: Permission | readonly Permission[] };
type None = z.ZodUndefined;

/**
 * A route with its access rule. The class leaves this file as a type, so the four functions below are the only way to
 * make one, and the application registers nothing else.
 */
class Route {
  readonly #ruled = true;

  private constructor(
    readonly rule: RouteRule,
    private readonly definition: RouteDefinition<string, never, z.ZodType, z.ZodType, z.ZodType>,
  ) {}

  static of<Access, Params extends z.ZodType, Query extends z.ZodType, Body extends z.ZodType>(
    rule: RouteRule,
    definition: RouteDefinition<string, Access, Params, Query, Body>,
  ): Route {
    // The one place where the handler's types are forgotten: routes of all kinds share a list, and registration
    // hands each handler exactly what its own schemas and rule produced.
    return new Route(rule, definition as unknown as RouteDefinition<string, never, z.ZodType, z.ZodType, z.ZodType>);
  }

  get ruled(): boolean {
    return this.#ruled;
  }
  get method(): HttpMethod {
    return this.definition.method;
  }
  get path(): string {
    return this.definition.path;
  }
  get summary(): string {
    return this.definition.summary;
  }
  get params(): z.ZodType | undefined {
    return this.definition.params;
  }
  get query(): z.ZodType | undefined {
    return this.definition.query;
  }
  get body(): z.ZodType | undefined {
    return this.definition.body;
  }
  get upload(): UploadRule | undefined {
    return this.definition.upload;
  }
  get answers(): Answers {
    return this.definition.answers;
  }
  get bodyLimitBytes(): number {
    return this.definition.bodyLimitBytes ?? BODY_LIMIT_BYTES;
  }
  get bodyAs(): 'json' | 'bytes' {
    return this.definition.bodyAs ?? 'json';
  }
  /** Whether it may change something, and so must prove where it comes from. */
  get mutates(): boolean {
    return this.method !== 'get';
  }

  async handle(context: HandlerContext<unknown, unknown, unknown, unknown>): Promise<void> {
    await this.definition.handler(context as HandlerContext<never, unknown, unknown, unknown>);
  }
}
export type { Route };

/** Open to anyone; the API description shows it as such. */
export function publicRoute<
  Params extends z.ZodType = None,
  Query extends z.ZodType = None,
  Body extends z.ZodType = None,
>(definition: RouteDefinition<string, undefined, Params, Query, Body>): Route {
  return Route.of({ kind: 'public' }, definition);
}

/** Open to anyone signed in, whatever their roles; the handler may touch only what belongs to that person. */
export function signedInRoute<
  Params extends z.ZodType = None,
  Query extends z.ZodType = None,
  Body extends z.ZodType = None,
>(definition: RouteDefinition<string, PersonAccess, Params, Query, Body>): Route {
  return Route.of({ kind: 'signedIn' }, definition);
}

/** For people whose role at :siteId has the permission (or any one of a list). */
export function siteRoute<
  Params extends z.ZodType = None,
  Query extends z.ZodType = None,
  Body extends z.ZodType = None,
>(definition: RouteDefinition<`${string}:siteId${string}`, SiteAccess, Params, Query, Body> & Permitted): Route {
  return Route.of({ kind: 'site', anyOf: [definition.permission].flat() }, definition);
}

/** For people whose role at the site of :networkId has the permission (or any one of a list). */
export function networkRoute<
  Params extends z.ZodType = None,
  Query extends z.ZodType = None,
  Body extends z.ZodType = None,
>(definition: RouteDefinition<`${string}:networkId${string}`, NetworkAccess, Params, Query, Body> & Permitted): Route {
  return Route.of({ kind: 'network', anyOf: [definition.permission].flat() }, definition);
}
