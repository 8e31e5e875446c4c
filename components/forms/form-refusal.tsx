/** Why a form was refused, where no field of it is to blame. */
export function FormRefusal({ children }: { children: string | null }) {
  if (!children) return null;
  return (
    <p role="alert" className="text-13 text-wrong">
      {children}
    </p>
  );
}
