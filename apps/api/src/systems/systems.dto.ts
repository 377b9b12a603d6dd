import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { Transform, type TransformFnParams } from 'class-transformer';
import { IsBoolean, IsInt, IsObject, IsOptional, IsString, IsUUID, MaxLength } from 'class-validator';
import { PageOf, PageQuery } from '../common/paging.js';
import { PersonDto } from '../common/person.dto.js';

const asBoolean = ({ value }: TransformFnParams): unknown =>
  value === 'true' ? true : value === 'false' ? false : value;

/** The columns that systems are sorted by. */
export const SYSTEM_SORT = { name: 'system.name', updated: 'system.updatedAt', created: 'system.createdAt' } as const;

export class SystemQuery extends PageQuery {
  @ApiPropertyOptional({ description: 'part of the name' })
  @IsOptional()
  @IsString()
  @MaxLength(200)
  q?: string;

  @ApiPropertyOptional({ description: 'holds a nucleus of this isotope' })
  @IsOptional()
  @IsString()
  @MaxLength(10)
  nuclide?: string;

  @ApiPropertyOptional()
  @IsOptional()
  @IsUUID()
  owner?: string;

  @ApiPropertyOptional()
  @IsOptional()
  @Transform(asBoolean)
  @IsBoolean({ message: 'must be true or false' })
  shared?: boolean;

  @ApiPropertyOptional({ default: false })
  @IsOptional()
  @Transform(asBoolean)
  @IsBoolean({ message: 'must be true or false' })
  archived?: boolean;

  @ApiPropertyOptional({
    type: String,
    default: '-updated',
    description: 'name, updated or created; - before it is descending',
  })
  @IsOptional()
  @IsString()
  sort = '-updated';
}

export class NewSystemDto {
  @ApiProperty({ type: 'object', additionalProperties: true, description: 'heddle.spin-system/1' })
  @IsObject({ message: 'must be a spin system' })
  document: Record<string, unknown>;

  @ApiPropertyOptional()
  @IsOptional()
  @IsString()
  @MaxLength(2000)
  note?: string;

  @ApiPropertyOptional({ default: false })
  @IsOptional()
  @IsBoolean()
  shared?: boolean;
}

export class SystemChangeDto {
  @ApiProperty()
  @IsInt({ message: 'must be a whole number' })
  version: number;

  @ApiPropertyOptional()
  @IsOptional()
  @IsBoolean()
  shared?: boolean;

  @ApiPropertyOptional()
  @IsOptional()
  @IsBoolean()
  archived?: boolean;

  @ApiPropertyOptional({ description: 'a member who becomes the owner' })
  @IsOptional()
  @IsUUID()
  ownerId?: string;
}

export class NewRevisionDto {
  @ApiProperty({ description: 'number of the revision that was changed' })
  @IsInt({ message: 'must be a whole number' })
  basedOn: number;

  @ApiProperty({ type: 'object', additionalProperties: true, description: 'heddle.spin-system/1' })
  @IsObject({ message: 'must be a spin system' })
  document: Record<string, unknown>;

  @ApiPropertyOptional()
  @IsOptional()
  @IsString()
  @MaxLength(2000)
  note?: string;
}

export class SystemDto {
  @ApiProperty() id: string;
  @ApiProperty() name: string;
  @ApiProperty({ type: PersonDto }) owner: PersonDto;
  @ApiProperty() shared: boolean;
  @ApiProperty() archived: boolean;
  @ApiProperty() latestRevision: number;
  @ApiProperty({ type: [String] }) nuclides: string[];
  @ApiProperty() nucleusCount: number;
  @ApiProperty() createdAt: string;
  @ApiProperty() updatedAt: string;
  @ApiProperty() version: number;
}

export class RevisionDto {
  @ApiProperty() number: number;
  @ApiProperty({ type: 'object', additionalProperties: true }) document: Record<string, unknown>;
  @ApiProperty({ type: String, nullable: true }) note: string | null;
  @ApiProperty({ type: PersonDto }) author: PersonDto;
  @ApiProperty() createdAt: string;
}

export class SystemPageDto extends PageOf(SystemDto) {}
export class RevisionPageDto extends PageOf(RevisionDto) {}
