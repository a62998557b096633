/** The blade with its bite: the product's sign. */
export function Mark() {
  return (
    <svg viewBox="0 0 8 26" aria-hidden="true">
      <path d="M0 0H8V8L3 13L8 18V26H0Z" />
    </svg>
  );
}
