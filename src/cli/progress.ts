import { type Io, paint } from './io.js';

const BAR_WIDTH = 24;
/** Redrawn at most this often: a terminal over a slow line must not hold up the work. */
const REDRAW_MS = 100;

/** How far a piece of work has come, on one line of a terminal; nothing is written anywhere else. */
export interface Progress {
  update(done: number, total: number, what: string): void;
  /** Takes the line away. */
  end(): void;
}

/** A progress line with the time left, or one that writes nothing where messages do not go to a terminal. */
export function progressLine(
  io: Io,
  isQuiet: boolean,
  nowMs: () => number = () => performance.now(),
): Progress {
  if (!io.isTerminal || isQuiet) return { update() {}, end() {} };
  const startedMs = nowMs();
  let drawnMs = Number.NEGATIVE_INFINITY;
  return {
    update(done, total, what) {
      const ms = nowMs();
      if (done < total && ms - drawnMs < REDRAW_MS) return;
      drawnMs = ms;
      const share = total > 0 ? done / total : 1;
      const filled = Math.round(share * BAR_WIDTH);
      const bar = `${'━'.repeat(filled)}${paint(io, 'faint', '┈'.repeat(BAR_WIDTH - filled))}`;
      const left =
        done > 0 && done < total ? `, ${clock(((ms - startedMs) * (1 - share)) / share)} left` : '';
      const text = ` ${done} of ${total}${left}  ${what}`;
      io.err(`\r\u001b[K${bar}${text.slice(0, Math.max(0, io.width - BAR_WIDTH - 1))}`);
    },
    end() {
      io.err('\r\u001b[K');
    },
  };
}

/** Minutes and seconds, or hours and minutes. */
export function clock(ms: number): string {
  const s = Math.ceil(ms / 1000);
  if (s >= 3600)
    return `${Math.floor(s / 3600)} h ${String(Math.floor((s % 3600) / 60)).padStart(2, '0')} min`;
  return `${Math.floor(s / 60)}:${String(s % 60).padStart(2, '0')}`;
}
