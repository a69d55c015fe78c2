import { Notice } from '@/components/ui/notice';

/** What is wrong with a form as a whole, beside no field; nothing while all is well. */
export function FormProblem({ title, message }: { title: string; message: string | undefined }) {
  if (!message) return null;
  return (
    <Notice tone="stop" live title={title}>
      {message}
    </Notice>
  );
}
