import { inject, Injectable } from '@angular/core';
import { MatDialog } from '@angular/material/dialog';
import { firstValueFrom } from 'rxjs';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { DeleteDialog, type DeleteQuestion } from './delete-dialog';

/** Says what goes along before anything is deleted. In the drawing page's `providers`. */
@Injectable()
export class DeletePrompt {
  private readonly dialog = inject(MatDialog);
  private readonly commands = inject(DrawingCommands);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);

  /** True when the elements were deleted. */
  async ask(ids: ReadonlySet<string>): Promise<boolean> {
    if (ids.size === 0) return false;
    const data: DeleteQuestion = {
      names: [...ids].map((id) => this.scene.tagOf(id)),
      goingAlong: this.commands.goingAlong(ids),
    };
    const opened = this.dialog.open<DeleteDialog, DeleteQuestion, boolean>(DeleteDialog, {
      data,
      width: '400px',
      restoreFocus: false,
    });
    const agreed = await firstValueFrom(opened.afterClosed());
    if (agreed === true) return this.commands.remove(ids);
    this.state.focusOn(this.state.focusId());
    return false;
  }
}
