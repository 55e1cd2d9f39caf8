import { Controller, Get, Header, Param, StreamableFile } from '@nestjs/common';
import { previewOf } from '../assessment/sound-preview.js';
import { NotFound } from '../errors.js';
import { wavBytes } from '../science/acoustics/preview.js';
import { PlansService } from './plans.service.js';

const which = { 'before.wav': 'before', 'after.wav': 'after' } as const;
const isFile = (name: string): name is keyof typeof which => Object.hasOwn(which, name);

/** The illustrations of the sound cards: worked out when asked for, kept nowhere. */
@Controller('plans')
export class SoundPreviewController {
  constructor(private readonly plans: PlansService) {}

  @Get(':id/sound/:index/:file')
  @Header('cache-control', 'private, no-cache')
  async preview(
    @Param('id') id: string,
    @Param('index') index: string,
    @Param('file') file: string,
  ): Promise<StreamableFile> {
    const { outcome } = await this.plans.open(id);
    if (outcome.assessment === undefined) throw outcome.failure;
    const result = /^\d{1,4}$/.test(index) ? outcome.assessment.sound[Number(index)] : undefined;
    const pair = result && isFile(file) ? previewOf(result) : null;
    if (pair === null || !isFile(file)) {
      throw new NotFound(
        'There is no such illustration.',
        'Open it from the sound card of the plan; what is refused or has no number has none.',
      );
    }
    return new StreamableFile(wavBytes(pair[which[file]]), { type: 'audio/wav' });
  }
}
