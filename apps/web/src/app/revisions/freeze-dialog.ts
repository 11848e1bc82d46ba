import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  signal,
  viewChild,
  type ElementRef,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import {
  MatDialogActions,
  MatDialogClose,
  MatDialogContent,
  MatDialogRef,
  MatDialogTitle,
} from '@angular/material/dialog';
import { NewRevision, type Problem } from '@riseback/contracts';
import { firstValueFrom } from 'rxjs';
import { EditQueue } from '../networks/edit-queue';
import { NetworkStore } from '../networks/network-store';
import { countVerdicts } from '../results/verdict';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { toProblem } from '../shared/problem';
import { StatusMark } from '../shared/status-mark/status-mark';
import { TextDrafts } from '../shared/text-drafts';
import { freezeObstacle } from './freeze-obstacle';
import { RevisionApi } from './revision-api';
import { RevisionHistory } from './revision-history';

let dialogCount = 0;

/** Asks what is frozen and why, and says what state it is in. Closes with the new revision's id. */
@Component({
  selector: 'app-freeze-dialog',
  imports: [MatButton, MatDialogActions, MatDialogClose, MatDialogContent, MatDialogTitle, ProblemBanner, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './freeze-dialog.html',
  styleUrl: './freeze-dialog.scss',
})
export class FreezeDialog {
  protected readonly store = inject(NetworkStore);
  private readonly queue = inject(EditQueue);
  private readonly api = inject(RevisionApi);
  private readonly history = inject(RevisionHistory);
  private readonly drafts = inject(TextDrafts);
  private readonly dialog = inject<MatDialogRef<FreezeDialog, string>>(MatDialogRef);

  private readonly titleBox = viewChild<ElementRef<HTMLInputElement>>('titleBox');
  private readonly reasonBox = viewChild<ElementRef<HTMLTextAreaElement>>('reasonBox');
  protected readonly id = `freeze-${String(++dialogCount)}`;
  protected readonly version = this.queue.version;
  private readonly about = `freeze/${this.store.networkId()}`;
  protected readonly title = signal(this.drafts.read(`${this.about}/title`));
  protected readonly reason = signal(this.drafts.read(`${this.about}/reason`));
  protected readonly complaints = signal<ReadonlyMap<string, string>>(new Map());
  protected readonly problem = signal<Problem | null>(null);
  protected readonly busy = signal(false);

  protected readonly obstacle = computed(() =>
    freezeObstacle(this.store.saveState(), this.store.solveState(), this.store.conflicts().length),
  );
  /** What is frozen with its verdicts, case by case. */
  protected readonly cases = computed(() =>
    (this.store.finished()?.cases ?? []).map((outcome) => {
      const name = this.store.nameOfCase(outcome.caseId);
      const solved = outcome.status === 'solved' && outcome.result.converged ? outcome.result : null;
      return {
        id: outcome.caseId,
        name: name === '' ? 'The network as drawn' : name,
        counts: solved === null ? null : countVerdicts(solved),
        partial: solved?.partial === true,
      };
    }),
  );

  protected keepTitle(text: string): void {
    this.title.set(text);
    this.drafts.keep(`${this.about}/title`, text);
  }

  protected keepReason(text: string): void {
    this.reason.set(text);
    this.drafts.keep(`${this.about}/reason`, text);
  }

  protected async freeze(): Promise<void> {
    const read = NewRevision.safeParse({
      title: this.title(),
      reason: this.reason(),
      networkVersion: this.version(),
    });
    this.complaints.set(new Map());
    if (!read.success) {
      this.complain(read.error.issues.map(({ path, message }) => [String(path[0]), message] as const));
      return;
    }
    this.busy.set(true);
    this.problem.set(null);
    try {
      const { id } = await firstValueFrom(this.api.freeze(this.store.networkId(), read.data));
      this.drafts.keep(`${this.about}/title`, '');
      this.drafts.keep(`${this.about}/reason`, '');
      this.history.reload();
      this.dialog.close(id);
    } catch (error) {
      this.problem.set(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }

  private complain(issues: readonly (readonly [string, string])[]): void {
    const empty = { title: this.title().trim() === '', reason: this.reason().trim() === '' };
    const words = new Map(issues);
    if (empty.title) words.set('title', 'Give it a title: what a list of revisions shows.');
    if (empty.reason) words.set('reason', 'Say what it is for: reviewers read it first.');
    this.complaints.set(words);
    (words.has('title') ? this.titleBox() : this.reasonBox())?.nativeElement.focus();
  }
}
