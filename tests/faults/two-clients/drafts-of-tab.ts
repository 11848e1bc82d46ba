import { Drafts } from '../../../apps/web/src/app/networks/drafts';

/** The drafts of one tab, which writes no more once it has crashed. */
export class DraftsOfTab extends Drafts {
  dead = false;

  override put(...args: Parameters<Drafts['put']>): Promise<void> {
    return this.dead ? Promise.resolve() : super.put(...args);
  }

  override remove(...args: Parameters<Drafts['remove']>): Promise<void> {
    return this.dead ? Promise.resolve() : super.remove(...args);
  }
}
