import { classNames } from './class-names.ts'

/** Own drawings on a 20 × 20 field, stroke 1.5. */
const paths = {
  bench: 'M3 16H17M3 16V12H17V16M6 12V7H9V12M12 12V9L15 6M6 5V3H9V5',
  notebook: 'M4 2.5H13L16 5.5V17.5H4ZM11.5 2.5V17.5M6.5 7H9.5M6.5 10H9.5M6.5 13H9.5',
  trace: 'M3 10H7L9 4L12 16L14 10H17',
  eye: 'M2 10C5 5 15 5 18 10C15 15 5 15 2 10ZM10 7.5V12.5M7.8 10H12.2',
  chain: 'M3 3H9V9H3ZM11 11H17V17H11ZM9 9L11 11M13 3H17V7M3 13V17H7',
  more: 'M4 10H4.1M10 10H10.1M16 10H16.1',
  file: 'M4 2.5H12L16 6.5V17.5H4ZM7 10H13M7 13H11',
  image: 'M3 4H17V16H3ZM3 13L7 9L11 13L13 11L17 15M12.5 7.5H12.6',
  remark: 'M3 4H17V13H9L5 17V13H3Z',
  pen: 'M4 16L5 12L13 4L16 7L8 15ZM11.5 5.5L14.5 8.5',
  clock: 'M10 3A7 7 0 1 0 10 17A7 7 0 0 0 10 3ZM10 6V10L13 12',
  lock: 'M5 9H15V17H5ZM7 9V6A3 3 0 0 1 13 6V9',
  key: 'M12.5 3A4.5 4.5 0 1 0 12.5 12A4.5 4.5 0 0 0 12.5 3ZM9.3 10.7L3 17M3 17H6M5.5 14.5L7.5 16.5',
  download: 'M10 3V13M5 9L10 14L15 9M4 17H16',
  upload: 'M10 14V4M5 8L10 3L15 8M4 17H16',
  plus: 'M10 4V16M4 10H16',
  minus: 'M4 10H16',
  cross: 'M5 5L15 15M15 5L5 15',
  tick: 'M4 11L8 15L16 5',
  caret: 'M5 8L10 13L15 8',
  alert: 'M10 3L18 16.5H2ZM10 8V12M10 14.2V14.4',
  search: 'M9 3A6 6 0 1 0 9 15A6 6 0 0 0 9 3ZM13.4 13.4L17 17',
  gear: 'M10 7A3 3 0 1 0 10 13A3 3 0 0 0 10 7ZM10 2.5V5M10 15V17.5M2.5 10H5M15 10H17.5',
  people:
    'M7 4A3 3 0 1 0 7 10A3 3 0 0 0 7 4ZM2 17C2 13.5 4 12 7 12S12 13.5 12 17M13 5A2.6 2.6 0 0 1 13 10M14 12.4C16.6 12.8 18 14.4 18 17',
  table: 'M3 4H17V16H3ZM3 8H17M3 12H17M8 8V16',
  link: 'M8 12L12 8M7 9L4.5 11.5A2.8 2.8 0 0 0 8.5 15.5L11 13M9 7L11.5 4.5A2.8 2.8 0 0 1 15.5 8.5L13 11',
  moon: 'M15.5 12A7 7 0 1 1 8 4.5A5.5 5.5 0 0 0 15.5 12Z',
} as const

export type IconName = keyof typeof paths

/** An ornament beside words: it is hidden from screen readers, the words carry the meaning. */
export function Icon({ name, size = 16, className }: { name: IconName; size?: number; className?: string }) {
  return (
    <svg
      className={classNames('hs-icon', className)}
      width={size}
      height={size}
      viewBox="0 0 20 20"
      aria-hidden
    >
      <path d={paths[name]} />
    </svg>
  )
}
