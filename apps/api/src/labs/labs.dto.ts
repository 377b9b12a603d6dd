import { ApiProperty } from '@nestjs/swagger';
import { IsInt, IsNotEmpty, IsString, MaxLength } from 'class-validator';

export class LabDto {
  @ApiProperty() id: string;
  @ApiProperty() name: string;
  @ApiProperty({ description: 'grows with every change; a change says which version it was based on' }) version: number;
}

export class LabChangeDto {
  @ApiProperty()
  @IsString({ message: 'must be text' })
  @IsNotEmpty({ message: 'must not be empty' })
  @MaxLength(120, { message: 'must have at most 120 characters' })
  name: string;

  @ApiProperty()
  @IsInt({ message: 'must be a whole number' })
  version: number;
}
