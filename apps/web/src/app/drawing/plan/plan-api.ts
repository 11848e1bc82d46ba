import { HttpClient, type HttpEvent, HttpEventType, HttpParams } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { NetworkPlan, type PlanPlacement } from '@riseback/contracts';
import { map, type Observable } from 'rxjs';

export interface PlanImage {
  readonly content: Blob;
  readonly name: string;
  readonly x: number;
  readonly y: number;
  readonly unitsPerPixel: number;
}

/** How far an upload is: a share of 1, then the plan as the server has it. */
export type UploadStep =
  { readonly kind: 'underWay'; readonly share: number } | { readonly kind: 'done'; readonly state: NetworkPlan };

@Injectable({ providedIn: 'root' })
export class PlanApi {
  private readonly http = inject(HttpClient);

  get(networkId: string): Observable<NetworkPlan> {
    return this.http.get<unknown>(planAt(networkId)).pipe(map((body) => NetworkPlan.parse(body)));
  }

  image(networkId: string, fileId: string): Observable<Blob> {
    return this.http.get(`${planAt(networkId)}/image/${fileId}`, { responseType: 'blob' });
  }

  upload(
    networkId: string,
    version: number,
    { content, name, x, y, unitsPerPixel }: PlanImage,
  ): Observable<UploadStep> {
    const params = new HttpParams({ fromObject: { name, x, y, unitsPerPixel } });
    const headers = { 'Content-Type': content.type, ...madeOn(version) };
    return this.http
      .put<unknown>(`${planAt(networkId)}/image`, content, { params, headers, reportProgress: true, observe: 'events' })
      .pipe(map(stepOf));
  }

  place(networkId: string, version: number, placement: PlanPlacement): Observable<NetworkPlan> {
    return this.http
      .put<unknown>(planAt(networkId), placement, { headers: madeOn(version) })
      .pipe(map((body) => NetworkPlan.parse(body)));
  }

  remove(networkId: string, version: number): Observable<NetworkPlan> {
    return this.http
      .delete<unknown>(planAt(networkId), { headers: madeOn(version) })
      .pipe(map((body) => NetworkPlan.parse(body)));
  }
}

function planAt(networkId: string): string {
  return `/api/networks/${networkId}/plan`;
}

function madeOn(version: number): { 'If-Match': string } {
  return { 'If-Match': `"${String(version)}"` };
}

function stepOf(event: HttpEvent<unknown>): UploadStep {
  if (event.type === HttpEventType.Response) return { kind: 'done', state: NetworkPlan.parse(event.body) };
  const isUpload = event.type === HttpEventType.UploadProgress && event.total !== undefined && event.total > 0;
  return { kind: 'underWay', share: isUpload ? event.loaded / (event.total ?? 1) : event.type === 0 ? 0 : 1 };
}
