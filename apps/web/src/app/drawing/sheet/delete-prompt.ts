import { inject, Injectable } from '@angular/core';
import { MatDialog } from '@angular/material/dialog';
import { firstValueFrom } from 'rxjs';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { nameOf } from '../../shared/element-words';
import { DeleteDialog, type DeleteQuestion } from './delete-dialog';

/** Says what goes along before anything is deleted. In the drawing page's `providers`. */
@Injectable()
export class DeletePrompt {
  private readonly dialog = inject(MatDialog);
  private readonly commands = inject(DrawingCommands);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  async ask(ids: ReadonlySet<string>): Promise<void> {
    if (ids.size === 0) return;
    const { nodes, pipes } = this.scene.settled();
    const names = [...ids].map((id) => {
      const element = nodes.get(id)?.node ?? pipes.get(id)?.pipe;
      return element === undefined ? id : nameOf(element);
    });
    const data: DeleteQuestion = { names, goingAlong: this.commands.goingAlong(ids) };
    const opened = this.dialog.open<DeleteDialog, DeleteQuestion, boolean>(DeleteDialog, {
      data,
      width: '400px',
      restoreFocus: false,
    });
    const agreed = await firstValueFrom(opened.afterClosed());
    if (agreed === true) this.commands.remove(ids);
    else this.state.focusOn(this.state.focusId());
  }
}
