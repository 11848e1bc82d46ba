import { inject, Injectable } from '@angular/core';
import { firstValueFrom } from 'rxjs';
import { saveFile } from '../shared/save-file';
import { NetworkApi } from './network-api';

/** Networks as files: `riseback-network`, the form that goes into another installation with nothing lost. */
@Injectable({ providedIn: 'root' })
export class NetworkFiles {
  private readonly api = inject(NetworkApi);

  /** Saves the network as the server has it; answers what the file is called. */
  async save({ id, name }: { readonly id: string; readonly name: string }): Promise<string> {
    const file = await firstValueFrom(this.api.file(id));
    const fileName = `${name.replace(/[\\/:*?"<>|\p{Cc}]+/gu, ' ').trim() || 'network'}.riseback.json`;
    saveFile(fileName, new Blob([`${JSON.stringify(file, null, 2)}\n`], { type: 'application/json' }));
    return fileName;
  }
}
