import { IsDateString, IsOptional, IsString, Matches, MaxLength } from 'class-validator';

/** The few entries a plan begins with. Blank fields never reach a form class. */
export class PlanCreateForm {
  @IsString({ message: 'Enter a name for the event' })
  @MaxLength(160, { message: 'Shorten the name to 160 characters or fewer' })
  title!: string;

  @IsString({ message: 'Choose the venue' })
  @Matches(/^[\w-]{1,60}$/, { message: 'Choose the venue from the list' })
  venueId!: string;

  @IsOptional()
  @IsDateString({ strict: true }, { message: 'Write the date as 2026-01-31' })
  @Matches(/^\d{4}-\d{2}-\d{2}$/, { message: 'Write the date as 2026-01-31' })
  date?: string;
}

/** A plan file, as an uploaded file or as pasted text. */
export class PlanImportForm {
  @IsOptional()
  @IsString({ message: 'The file cannot be read as text' })
  file?: string;

  @IsOptional()
  @IsString({ message: 'The text cannot be read' })
  text?: string;
}
