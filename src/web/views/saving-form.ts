import { Transform } from 'class-transformer';
import { IsIn, IsInt, IsOptional, Matches, Min } from 'class-validator';

/** A blank or missing text stays missing; anything else must be a whole number. */
const WholeNumber = (): PropertyDecorator =>
  Transform(({ value }: { value: unknown }) =>
    typeof value === 'string' && /^\d{1,9}$/.test(value) ? Number(value) : value,
  );

/** What every saving form carries besides its content. */
export class SavingForm {
  @IsOptional()
  @WholeNumber()
  @IsInt({ message: 'This form was damaged on its way: load the page again' })
  @Min(1, { message: 'This form was damaged on its way: load the page again' })
  version?: number;

  @IsOptional()
  @Matches(/^(save|addDemonstration|(add|remove):[A-Za-z]+(\.\d{1,4}(\.[A-Za-z]+)*)*)$/, {
    message: 'This button does not exist here: load the page again',
  })
  do?: string;
}

export class RemovalForm {
  @WholeNumber()
  @IsInt({ message: 'This form was damaged on its way: load the page again' })
  version!: number;

  @IsIn(['on'], { message: 'Tick the box to delete it for good' })
  sure!: string;
}
