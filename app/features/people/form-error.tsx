/** What the server said about the whole form, above its button. */
export function FormError({ children }: { readonly children: string | undefined }) {
  return (
    <div role="alert" aria-atomic="true">
      {children ? <p className="notice ink small mt-4">{children}</p> : null}
    </div>
  );
}
