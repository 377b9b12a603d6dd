import { VARIED, type Varied } from '@heddle/shared';
import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { Type } from 'class-transformer';
import {
  ArrayMaxSize,
  ArrayMinSize,
  IsIn,
  IsInt,
  IsNotEmpty,
  IsNumber,
  IsObject,
  IsOptional,
  IsString,
  IsUUID,
  MaxLength,
  Min,
  ValidateNested,
} from 'class-validator';
import { PageOf } from '../common/paging.js';
import { PersonDto } from '../common/person.dto.js';
import { RunDto } from '../runs/runs.dto.js';

/** Runs that one series may have. */
export const MOST_VALUES = 60;

export class VariationDto {
  @ApiProperty({ enum: VARIED })
  @IsIn(VARIED, { message: `must be one of ${VARIED.join(', ')}` })
  quantity: Varied;

  @ApiPropertyOptional({ description: "the exchange step 'from,to' or the coupling 'a,b'; the first by default" })
  @IsOptional()
  @IsString({ message: 'must be text' })
  @MaxLength(40)
  target?: string;

  @ApiProperty({ type: [Number] })
  @ArrayMinSize(2, { message: 'must have at least 2 values' })
  @ArrayMaxSize(MOST_VALUES, { message: `must have at most ${MOST_VALUES} values` })
  @IsNumber({}, { each: true, message: 'must be numbers' })
  values: number[];
}

export class NewSeriesDto {
  @ApiProperty()
  @IsString({ message: 'must be text' })
  @IsNotEmpty({ message: 'must not be empty' })
  @MaxLength(200)
  name: string;

  @ApiProperty()
  @IsUUID()
  systemId: string;

  @ApiProperty()
  @IsInt({ message: 'must be a whole number' })
  @Min(1)
  revision: number;

  @ApiProperty({ type: 'object', additionalProperties: true, description: 'heddle.experiment/1' })
  @IsObject({ message: 'must be an experiment' })
  experiment: Record<string, unknown>;

  @ApiProperty({ type: VariationDto })
  @ValidateNested()
  @Type(() => VariationDto)
  vary: VariationDto;
}

export class SeriesDto {
  @ApiProperty() id: string;
  @ApiProperty() name: string;
  @ApiProperty({ type: PersonDto }) system: PersonDto;
  @ApiProperty() revision: number;
  @ApiProperty({ type: PersonDto }) owner: PersonDto;
  @ApiProperty({ type: VariationDto }) vary: VariationDto;
  @ApiProperty() createdAt: string;
  @ApiProperty({ type: [RunDto], description: 'one for each value, in their order' }) runs: RunDto[];
}

export class SeriesPageDto extends PageOf(SeriesDto) {}
