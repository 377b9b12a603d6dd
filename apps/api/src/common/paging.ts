import { ApiProperty, ApiPropertyOptional } from '@nestjs/swagger';
import { Type } from 'class-transformer';
import { IsInt, IsOptional, IsString, Max, Min } from 'class-validator';
import type { ObjectLiteral, SelectQueryBuilder } from 'typeorm';
import { refusedFields } from './problem.js';

/** Query of every list: how many, and where the last page ended. */
export class PageQuery {
  @ApiPropertyOptional({ type: Number, default: 50, minimum: 1, maximum: 200 })
  @IsOptional()
  @Type(() => Number)
  @IsInt()
  @Min(1)
  @Max(200)
  limit = 50;

  @ApiPropertyOptional({ description: 'nextCursor of the page before' })
  @IsOptional()
  @IsString()
  cursor?: string;
}

/** A page of a list. */
export interface Paged<T> {
  items: T[];
  nextCursor: string | null;
}

/** The DTO class of a page of `item`, for the OpenAPI document. */
export function PageOf<T>(item: new () => T) {
  class Page implements Paged<T> {
    @ApiProperty({ type: [item] })
    items: T[];

    @ApiProperty({ type: String, nullable: true })
    nextCursor: string | null;
  }
  Object.defineProperty(Page, 'name', { value: `${item.name}Page` });
  return Page;
}

/** A sort key of a closed set: the column it stands for, `-key` is descending. */
export type SortKeys = Readonly<Record<string, string>>;

/**
 * One page of `query`, sorted by `sort` and then by id, so that the order is total. A cursor holds the number of rows
 * seen; lists here are short enough for that.
 */
export async function page<T extends ObjectLiteral>(
  query: SelectQueryBuilder<T>,
  { limit, cursor }: PageQuery,
  sort: string,
  keys: SortKeys,
): Promise<Paged<T>> {
  const descending = sort.startsWith('-');
  const column = keys[descending ? sort.slice(1) : sort];
  if (!column)
    throw refusedFields([
      { path: 'sort', message: `must be one of ${Object.keys(keys).join(', ')}, or with a - before it` },
    ]);
  const start = cursor === undefined ? 0 : Number(Buffer.from(cursor, 'base64url').toString());
  if (!Number.isSafeInteger(start) || start < 0)
    throw refusedFields([{ path: 'cursor', message: 'is no cursor of this list' }]);
  const rows = await query
    .orderBy(column, descending ? 'DESC' : 'ASC')
    .addOrderBy(`${query.alias}.id`, 'ASC')
    .skip(start)
    .take(limit + 1)
    .getMany();
  const more = rows.length > limit;
  return {
    items: rows.slice(0, limit),
    nextCursor: more ? Buffer.from(String(start + limit)).toString('base64url') : null,
  };
}
