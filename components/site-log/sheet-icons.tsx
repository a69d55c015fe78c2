export function PencilIcon() {
  return (
    <svg viewBox="0 0 16 16" width="16" height="16" aria-hidden="true">
      <path
        d="M2.5 13.5l.7-3L10.6 3l2.4 2.4-7.5 7.5-3 .6zM9.4 4.2l2.4 2.4"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.25"
      />
    </svg>
  );
}
