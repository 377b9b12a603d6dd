import { Alert } from '@mantine/core';

/** Above a form: what was refused and belongs to no field of it. */
export function FormRefusal({ message }: { message: string | null }) {
  if (!message) return null;
  return (
    <Alert color="madder" variant="outline" role="alert">
      {message}
    </Alert>
  );
}
