import cliProgress from 'cli-progress';
import type { Progress } from '../run/options.js';
import { stageWords, stageWordsWidth } from './stage-words.js';

/** Shows how far a run is; `end` clears the line. */
export interface ProgressDisplay {
  readonly show: (progress: Progress) => void;
  readonly end: () => void;
}

/** Time left of a stage, if it goes on as it went: `1 min 20 s left`. */
export function timeLeft(elapsedSeconds: number, done: number, total: number): string {
  if (done <= 0 || elapsedSeconds < 0.5) return '';
  const seconds = Math.ceil((elapsedSeconds * Math.max(0, total - done)) / done);
  if (seconds < 60) return `${seconds} s left`;
  const minutes = Math.floor(seconds / 60);
  if (minutes < 60) return `${minutes} min ${seconds % 60} s left`;
  return `${Math.floor(minutes / 60)} h ${minutes % 60} min left`;
}

const SILENT: ProgressDisplay = { show: () => {}, end: () => {} };

/** A bar with the stage, its round or size of the basis, and the time left of it, on a terminal; nothing anywhere else. */
export function progressOn(stream: NodeJS.WriteStream): ProgressDisplay {
  if (!stream.isTTY) return SILENT;
  let words: string | null = null;
  let stageStart = 0;
  const bar = new cliProgress.SingleBar({
    stream,
    clearOnComplete: true,
    hideCursor: false,
    // Ctrl-C is ours: it delivers the finished part.
    gracefulExit: false,
    fps: 5,
    barsize: 30,
    barCompleteChar: '▪',
    barIncompleteChar: '·',
    format: (options, params, payload) => {
      const bars = cliProgress.Format.BarFormat(params.progress, options);
      const share = `${Math.floor(100 * params.progress)}%`.padStart(4);
      return `${payload.words.padEnd(stageWordsWidth)} ${bars} ${share}  ${payload.left}`;
    },
  });
  return {
    show: (progress) => {
      const now = performance.now();
      const current = stageWords(progress);
      if (current !== words) {
        if (words !== null) bar.stop();
        words = current;
        stageStart = now;
        bar.start(progress.total, 0, { words, left: '' });
      }
      bar.update(progress.done, { left: timeLeft((now - stageStart) / 1000, progress.done, progress.total) });
    },
    end: () => {
      if (words !== null) bar.stop();
      words = null;
    },
  };
}
