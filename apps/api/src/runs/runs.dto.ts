import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { IsIn, IsInt, IsObject, IsOptional, IsString, IsUUID, Min, ValidateIf } from 'class-validator';
import { PageOf, PageQuery } from '../common/paging.js';
import { PersonDto } from '../common/person.dto.js';
import { RUN_STATES, type RunState } from './run.states.js';

/** The columns that runs are sorted by. */
export const RUN_SORT = { created: 'run.createdAt', finished: 'run.finishedAt', seconds: 'run.seconds' } as const;

export class RunQuery extends PageQuery {
  @ApiPropertyOptional({ enum: RUN_STATES })
  @IsOptional()
  @IsIn(RUN_STATES, { message: `must be one of ${RUN_STATES.join(', ')}` })
  state?: RunState;

  @ApiPropertyOptional({ description: 'id of a system' })
  @IsOptional()
  @IsUUID()
  system?: string;

  @ApiPropertyOptional()
  @IsOptional()
  @IsUUID()
  owner?: string;

  @ApiPropertyOptional({
    type: String,
    default: '-created',
    description: 'created, finished or seconds; - before it is descending',
  })
  @IsOptional()
  @IsString()
  sort = '-created';
}

export class NewRunDto {
  @ApiPropertyOptional({ description: 'with its revision; or the document itself as `system`' })
  @ValidateIf(({ system }: NewRunDto) => system === undefined)
  @IsUUID()
  systemId?: string;

  @ApiPropertyOptional()
  @ValidateIf(({ system }: NewRunDto) => system === undefined)
  @IsInt({ message: 'must be a whole number' })
  @Min(1)
  revision?: number;

  @ApiPropertyOptional({
    type: 'object',
    additionalProperties: true,
    description: 'heddle.spin-system/1, saved as a new system of the asker',
  })
  @IsOptional()
  @IsObject({ message: 'must be a spin system' })
  system?: Record<string, unknown>;

  @ApiProperty({ type: 'object', additionalProperties: true, description: 'heddle.experiment/1' })
  @IsObject({ message: 'must be an experiment' })
  experiment: Record<string, unknown>;
}

export class RunDto {
  @ApiProperty() id: string;
  @ApiProperty({ enum: RUN_STATES }) state: RunState;
  @ApiProperty({ description: '0..1' }) progress: number;
  @ApiProperty({ type: PersonDto }) system: PersonDto;
  @ApiProperty() revision: number;
  @ApiProperty({ type: 'object', additionalProperties: true }) experiment: Record<string, unknown>;
  @ApiProperty() engine: string;
  @ApiProperty({ type: PersonDto }) owner: PersonDto;
  @ApiProperty() createdAt: string;
  @ApiProperty({ type: String, nullable: true }) startedAt: string | null;
  @ApiProperty({ type: String, nullable: true }) finishedAt: string | null;
  @ApiProperty({ type: Number, nullable: true }) seconds: number | null;
  @ApiProperty({ type: String, nullable: true }) method: string | null;
  @ApiProperty() warnings: number;
  @ApiProperty({ type: String, nullable: true }) error: string | null;
  @ApiPropertyOptional({ description: 'true when the same three had been run before and that run is offered' })
  identical?: boolean;
}

export class RunPageDto extends PageOf(RunDto) {}

export class EstimateRequestDto {
  @ApiProperty({ type: 'object', additionalProperties: true, description: 'heddle.spin-system/1' })
  @IsObject({ message: 'must be a spin system' })
  system: Record<string, unknown>;

  @ApiProperty({ type: 'object', additionalProperties: true, description: 'heddle.experiment/1' })
  @IsObject({ message: 'must be an experiment' })
  experiment: Record<string, unknown>;
}

export class EstimateDto {
  @ApiProperty() method: string;
  @ApiProperty() seconds: number;
  @ApiProperty() bytes: number;
  @ApiProperty({ type: 'object', additionalProperties: { type: 'number' } }) dimensions: Record<string, number>;
}

export class WorkersDto {
  @ApiProperty({ description: 'threads of this process' }) threads: number;
  @ApiProperty({ description: 'threads that are computing' }) busy: number;
  @ApiProperty() queued: number;
  @ApiProperty() running: number;
}
