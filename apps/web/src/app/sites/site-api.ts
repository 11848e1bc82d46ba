import { HttpClient } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { Site, SiteSettings, type SiteSettingsChange } from '@riseback/contracts';
import { map, type Observable } from 'rxjs';

@Injectable({ providedIn: 'root' })
export class SiteApi {
  private readonly http = inject(HttpClient);

  list(): Observable<Site[]> {
    return this.http.get<unknown>('/api/sites').pipe(map((body) => Site.array().parse(body)));
  }

  get(siteId: string): Observable<Site> {
    return this.http.get<unknown>(`/api/sites/${siteId}`).pipe(map((body) => Site.parse(body)));
  }

  settings(siteId: string): Observable<SiteSettings> {
    return this.http.get<unknown>(`/api/sites/${siteId}/settings`).pipe(map((body) => SiteSettings.parse(body)));
  }

  changeSettings(siteId: string, change: SiteSettingsChange): Observable<SiteSettings> {
    return this.http
      .patch<unknown>(`/api/sites/${siteId}/settings`, change)
      .pipe(map((body) => SiteSettings.parse(body)));
  }
}
