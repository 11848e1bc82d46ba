import { HttpClient, HttpParams } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { AuditPage, type AuditFilter } from '@riseback/contracts';
import { map, type Observable } from 'rxjs';

@Injectable({ providedIn: 'root' })
export class AuditApi {
  private readonly http = inject(HttpClient);

  page(siteId: string, filter: AuditFilter, before?: number): Observable<AuditPage> {
    const fromObject = { ...given(filter), ...(before === undefined ? {} : { before }) };
    return this.http
      .get<unknown>(`/api/sites/${siteId}/audit`, { params: new HttpParams({ fromObject }) })
      .pipe(map((body) => AuditPage.parse(body)));
  }

  /** Where the browser fetches the file from. */
  exportUrl(siteId: string, filter: AuditFilter, format: 'csv' | 'json'): string {
    const params = new HttpParams({ fromObject: { ...given(filter), format } });
    return `/api/sites/${siteId}/audit-export?${params.toString()}`;
  }
}

function given(filter: AuditFilter): Record<string, string> {
  return Object.fromEntries(
    Object.entries(filter).flatMap(([key, value]) => (value === undefined ? [] : [[key, value] as const])),
  );
}
