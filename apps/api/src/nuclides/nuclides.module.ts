import { Controller, Get, Header, Module } from '@nestjs/common';
import { ApiOkResponse, ApiProperty, ApiTags } from '@nestjs/swagger';
import { NUCLIDE_TABLE } from '@heddle/shared';
import { Public } from '../auth/principal.js';

class NuclideDto {
  @ApiProperty({ example: '13C' }) isotope: string;
  @ApiProperty() spin: number;
  @ApiProperty({ description: 'frequency ratio to 1H of TMS in per cent (IUPAC 2001)' }) xi: number;
  @ApiProperty({ description: 'magnetogyric ratio, rad/(s T)' }) gamma: number;
}

@ApiTags('nuclides')
@Public()
@Controller('nuclides')
class NuclidesController {
  @Get()
  @Header('cache-control', 'public, max-age=86400')
  @ApiOkResponse({ type: [NuclideDto] })
  list(): NuclideDto[] {
    return NUCLIDE_TABLE.map(({ isotope, spin, xi, gamma }) => ({ isotope, spin, xi, gamma }));
  }
}

@Module({ controllers: [NuclidesController] })
export class NuclidesModule {}
