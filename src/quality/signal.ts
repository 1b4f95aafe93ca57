// Signal and consensus: an echo no stronger than those out of which the source itself could take no wind carries none, nor does
// an average on which the soundings disagree. Common practice, without source; thresholds of signal in absolute
// terms differ from one instrument to the next. (Consensus averaging of profilers: Strauch et al. 1984, from memory.)

import { MARK } from '../profile/index.ts';
import { quantile, type Screened } from './series.ts';

/** Gates without wind that are needed to know the noise. */
const FEWEST_WINDLESS = 12;
/** This share of the windless gates is weaker than the threshold. */
const NOISE_SHARE = 0.75;
/** Where more winds than this would fall, the signal does not tell wind from noise, and the screen stays silent. */
const MOST_LOST = 0.2;

/** On fewer than the first share of the soundings rests no wind; fewer than the second make it doubtful. */
const LEAST_CONSENSUS = 0.35;
const SOUND_CONSENSUS = 0.6;

/**
 * Adds `low-signal` to levels whose echo is as weak as that of gates without wind in the same series, and to those on which
 * hardly a third of the soundings agree; `few-beams` where they are not many.
 */
export function weakSignal({ block, series }: Screened, marks: Uint32Array): void {
  const { signal, speed, offsets, consensus } = block;
  if (consensus !== null) {
    for (let k = 0; k < marks.length; k++) {
      if (consensus[k]! < LEAST_CONSENSUS) marks[k]! |= MARK['low-signal'];
      else if (consensus[k]! < SOUND_CONSENSUS) marks[k]! |= MARK['few-beams'];
    }
  }
  if (signal === null) return;
  for (const { profiles } of series) {
    const windless: number[] = [];
    const windy: number[] = [];
    for (const i of profiles) {
      for (let k = offsets[i]!; k < offsets[i + 1]!; k++) {
        if (Number.isNaN(signal[k]!)) continue;
        if (Number.isNaN(speed[k]!)) windless.push(signal[k]!);
        else windy.push(k);
      }
    }
    if (windless.length < FEWEST_WINDLESS) continue;
    const threshold = quantile(windless, NOISE_SHARE);
    const weak = windy.filter((k) => signal[k]! <= threshold);
    if (weak.length <= MOST_LOST * windy.length) for (const k of weak) marks[k]! |= MARK['low-signal'];
  }
}
