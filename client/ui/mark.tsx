/** The mark: a bag tag with its punched hole, and two beats of the output. */
export function Mark({ className }: { className?: string }) {
  return (
    <svg aria-hidden="true" viewBox="0 0 64 64" className={className}>
      <path
        fillRule="evenodd"
        className="fill-spruce"
        d="M17 4H47L58 15V57.2C54 59.6 51 57.8 47 58.6C43 59.4 41 60.6 36 59.6C31 58.6 29 60.2 24 60C19 59.8 17 58 13 58.4C10 58.7 8 59.4 6 58V15ZM22 10.5A5.5 5.5 0 1 0 22 21.5A5.5 5.5 0 1 0 22 10.5Z"
      />
      <path
        fill="none"
        className="stroke-on-spruce"
        strokeWidth="4"
        strokeLinejoin="round"
        strokeLinecap="round"
        d="M13 48V31H26V48H38V31H51V48"
      />
    </svg>
  );
}
