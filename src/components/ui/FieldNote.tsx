/** Under a field: what is wrong with what stands in it, else what is worth knowing. Its `id` is what the field is described by. */
export function FieldNote({
  id,
  problem,
  hint,
}: {
  id: string;
  problem: string | undefined;
  hint: string | undefined;
}) {
  return (
    <p id={id} className={`mt-1 text-sm empty:hidden ${problem ? 'text-brick' : 'text-slate'}`}>
      {problem ?? hint}
    </p>
  );
}
