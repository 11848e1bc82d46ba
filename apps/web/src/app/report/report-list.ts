import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { ReportJob } from '@riseback/contracts';
import { type Status, StatusMark } from '../shared/status-mark/status-mark';
import { isUnfinished } from './report-store';
import { JOB_WORDS, sizeWords } from './report-words';

const MARKS: Readonly<Record<ReportJob['state'], Status>> = {
  waiting: 'none',
  running: 'none',
  finished: 'pass',
  failed: 'fail',
  cancelled: 'none',
};

/** One's reports of the last day: how far each is, and the way to its file. */
@Component({
  selector: 'app-report-list',
  imports: [MatButton, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './report-list.html',
  styleUrl: './report-list.scss',
})
export class ReportList {
  readonly jobs = input.required<readonly ReportJob[]>();
  readonly contentUrl = input.required<(jobId: string) => string>();
  /** What a revision is called; '' for one that is not known here. */
  readonly letterOf = input.required<(revisionId: string) => string>();
  readonly timeZone = input.required<string>();
  readonly cancelled = output<string>();
  readonly orderedAgain = output<ReportJob>();

  protected readonly rows = computed(() => {
    const clock = new Intl.DateTimeFormat('en-GB', {
      timeZone: this.timeZone(),
      day: 'numeric',
      month: 'short',
      hour: '2-digit',
      minute: '2-digit',
    });
    return this.jobs().map((job) => ({
      job,
      of: ofWords(job, this.letterOf()),
      ordered: clock.format(new Date(job.createdAt)),
      mark: MARKS[job.state],
      words: JOB_WORDS[job.state],
      unfinished: isUnfinished(job),
      percent: Math.round(100 * job.progress),
      size: job.sizeBytes === undefined ? '' : sizeWords(job.sizeBytes),
      url: this.contentUrl()(job.id),
      why: [job.problem?.title, job.problem?.detail].filter((text) => text !== undefined).join('. '),
    }));
  });
}

function ofWords({ revisionId }: ReportJob, letterOf: (id: string) => string): string {
  if (revisionId === undefined) return 'As it stood';
  const letter = letterOf(revisionId);
  return letter === '' ? 'A revision' : `Revision ${letter}`;
}
