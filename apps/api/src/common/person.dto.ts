import { ApiProperty } from '@nestjs/swagger';

/** A person or a thing, by name. */
export class PersonDto {
  @ApiProperty() id: string;
  @ApiProperty() name: string;
}
