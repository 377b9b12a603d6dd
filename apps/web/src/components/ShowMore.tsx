import { Button, Center } from '@mantine/core';

interface Paged {
  hasNextPage: boolean;
  isFetchingNextPage: boolean;
  fetchNextPage: () => unknown;
}

/** Below a list that has more pages. */
export function ShowMore({ query }: { query: Paged }) {
  if (!query.hasNextPage) return null;
  return (
    <Center mt="md">
      <Button variant="default" loading={query.isFetchingNextPage} onClick={() => void query.fetchNextPage()}>
        Show more
      </Button>
    </Center>
  );
}
