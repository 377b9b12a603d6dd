import type { ReactNode } from 'react';

/** Line drawings of 16 x 16, in the weight of the text beside them; always beside a word or inside a labelled button. */
function icon(drawing: ReactNode) {
  return function Icon({ size = 16 }: { size?: number }) {
    return (
      <svg
        width={size}
        height={size}
        viewBox="0 0 16 16"
        fill="none"
        stroke="currentColor"
        strokeWidth={1.4}
        strokeLinecap="round"
        strokeLinejoin="round"
        aria-hidden="true"
        style={{ flex: 'none' }}
      >
        {drawing}
      </svg>
    );
  };
}

export const QueuedIcon = icon(<path d="M4.5 2v12M8 2v12M11.5 2v12" />);
export const RunningIcon = icon(<path d="M4.5 2v12M8 2v12M11.5 2v12M2 8.5h9.5m-2-2l2 2l-2 2" />);
export const DoneIcon = icon(<path d="M2.5 8.5l3.5 3.5l7.5-8" />);
export const FailedIcon = icon(<path d="M8 2.2L14.3 13.5H1.7zM8 6.5v3.2M8 11.6v.1" />);
export const CancelledIcon = icon(<path d="M4 4l8 8M12 4l-8 8" />);
export const SearchIcon = icon(<path d="M7 12a5 5 0 1 0 0-10a5 5 0 0 0 0 10zM10.7 10.7L14 14" />);
export const PlusIcon = icon(<path d="M8 3v10M3 8h10" />);
export const CopyIcon = icon(<path d="M5.5 5.5V2.5h8v8h-3M2.5 5.5h8v8h-8z" />);
export const ArchiveIcon = icon(<path d="M2 3h12v3H2zM3 6v7.5h10V6M6.5 9h3" />);
export const RestoreIcon = icon(<path d="M2 3h12v3H2zM3 6v7.5h10V6M8 12V8.5m-1.8 1.6L8 8.3l1.8 1.8" />);
export const SharedIcon = icon(
  <path d="M5.5 7a2 2 0 1 0 0-4a2 2 0 0 0 0 4zM1.5 13c0-2.5 1.8-4 4-4s4 1.5 4 4M10.5 3.2a2 2 0 0 1 0 3.7M11 9.2c2 .3 3.5 1.6 3.5 3.8" />,
);
export const PrivateIcon = icon(<path d="M3.5 7h9v6.5h-9zM5.3 7V5a2.7 2.7 0 0 1 5.4 0v2" />);
export const MoreIcon = icon(<path d="M3 8h.01M8 8h.01M13 8h.01" strokeWidth={2.4} />);
export const MenuIcon = icon(<path d="M2 4.5h12M2 8h12M2 11.5h12" />);
export const ChevronDownIcon = icon(<path d="M4 6l4 4l4-4" />);
