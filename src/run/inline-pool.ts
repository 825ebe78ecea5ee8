import { answerUnit } from './answer.ts';
import type { Pool } from './pool.ts';
import { Vetter } from './vetter.ts';

/** Answers units one after the other in this thread. */
export const inlinePool: Pool = {
  async run({ folders, settings }, units, { onAnswer, onProgress }) {
    const vetter = new Vetter(folders, settings);
    for (const unit of units) onAnswer(unit, answerUnit(vetter, unit, onProgress));
  },
  async close() {},
};
