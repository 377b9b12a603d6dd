import { Alert, Button } from '@mantine/core';
import { messageOf } from '../api/problem';

/** Why something could not be shown or done, and the way to try again where there is one. */
export function Refusal({ error, retry }: { error: unknown; retry?: () => void }) {
  return (
    <Alert color="madder" variant="outline" role="alert" title={messageOf(error)} my="md">
      {retry && (
        <Button size="xs" variant="default" onClick={retry}>
          Try again
        </Button>
      )}
    </Alert>
  );
}
