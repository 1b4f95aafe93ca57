// The worker's end of the line.

import { expose, transfer } from 'comlink';
import { buffersOf, type ProfileBlock } from '../../profile/index.ts';
import { DeskService } from './desk-service.ts';
import type { Painted, PaintRequest } from './protocol.ts';

/** The service as it is seen across the line: what was made for the page is handed over instead of copied. */
class Endpoint extends DeskService {
  override paint(request: PaintRequest): Painted | null {
    const painted = super.paint(request);
    return painted === null ? null : transfer(painted, [painted.pixels.buffer]);
  }

  override profiles(feed: string, startMs: number, endMs: number): ProfileBlock | null {
    const block = super.profiles(feed, startMs, endMs);
    return block === null ? null : transfer(block, buffersOf(block));
  }
}

expose(new Endpoint());
