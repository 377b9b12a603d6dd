import { Alert } from '@mantine/core';

/** Above a form: what was refused and belongs to no field of it. */
export function FormRefusal({ message }: { message: string | null }) {
  return (
    <div role="alert">
      {message && (
        <Alert color="madder" variant="outline">
          {message}
        </Alert>
      )}
    </div>
  );
}
