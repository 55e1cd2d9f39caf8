import {
  IsDateString,
  IsIn,
  IsInt,
  IsOptional,
  IsString,
  Matches,
  Max,
  MaxLength,
  Min,
} from 'class-validator';
import { Type } from 'class-transformer';
import { airLogTexts as words } from '../web/texts/en-air-log.js';
import type { TimeUnit } from './decay-log-text.js';

const number = /^[\d.,\s-]{1,20}$/;

/** What the page about a log sends: the log itself, what is known beside it, and what to do. */
export class AirLogForm {
  @IsIn(['work', 'use'])
  do!: 'work' | 'use';

  @Type(() => Number)
  @IsInt()
  @Min(1)
  @Max(1e9)
  version!: number;

  @IsString({ message: words.problems.space })
  space!: string;

  @IsOptional()
  @IsString()
  file?: string;

  @IsOptional()
  @IsString()
  text?: string;

  @IsIn(['asWritten', 'seconds', 'minutes', 'hours', 'minutesAndSeconds'])
  timesIn!: TimeUnit;

  @IsOptional()
  @Matches(number, { message: `${words.fromMin}: ${words.problems.number}` })
  fromMin?: string;

  @IsOptional()
  @Matches(number, { message: `${words.untilMin}: ${words.problems.number}` })
  untilMin?: string;

  @IsOptional()
  @Matches(number, { message: `${words.volume}: ${words.problems.number}` })
  volumeM3?: string;

  @IsOptional()
  @Matches(number, { message: `${words.background}: ${words.problems.number}` })
  backgroundPpm?: string;

  @IsOptional()
  @Matches(/^\d{1,5}$/, { message: `${words.people}: ${words.problems.number}` })
  people?: string;

  @IsOptional()
  @IsString()
  part?: string;

  @IsOptional()
  @IsDateString({ strict: true }, { message: words.problems.on })
  @Matches(/^\d{4}-\d{2}-\d{2}$/, { message: words.problems.on })
  on?: string;

  @IsOptional()
  @MaxLength(80, { message: `${words.by}: 80 characters at most` })
  by?: string;

  @IsOptional()
  @MaxLength(200, { message: `${words.note}: 200 characters at most` })
  note?: string;
}
