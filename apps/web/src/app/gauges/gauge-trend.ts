import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import { StatusMark } from '../shared/status-mark/status-mark';
import { WORDS } from './agreement-lines';
import { TREND, type TrendFigure, type TrendPoint } from './trend-figure';

/** One gauge over the rounds, with the same numbers under it. */
@Component({
  selector: 'app-gauge-trend',
  imports: [StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './gauge-trend.html',
  styleUrl: './gauge-trend.scss',
})
export class GaugeTrend {
  readonly figure = input.required<TrendFigure>();

  protected readonly TREND = TREND;
  protected readonly statusOf = ({ word }: TrendPoint) => (word === null ? 'none' : WORDS[word].status);
}
