import { classNames } from './class-names.ts'
import { Tip } from './tip.tsx'
import { useTheme, type Level, type Theme } from './use-theme.ts'

const themes: { theme: Theme; word: string }[] = [
  { theme: 'day', word: 'Day' },
  { theme: 'dusk', word: 'Dusk' },
  { theme: 'darkroom', word: 'Dark-room' },
]

const levels: { level: Level; help: string }[] = [
  { level: 1, help: 'Dimmest: contrast about 2.6:1, for use within arm’s reach of a live detector' },
  { level: 2, help: 'Usual: contrast about 4:1' },
  { level: 3, help: 'Brightest: text contrast 4.5:1 and more' },
]

/** The screen is a light source: a row of three themes and, in the dark-room, three levels. */
export function ThemeChoice({ large = false }: { large?: boolean }) {
  const { theme, level, setTheme, setLevel } = useTheme()
  const size = large && 'hs-theme-large'
  return (
    <>
      <div className={classNames('hs-theme', size)} role="group" aria-label="Screen light">
        {themes.map((each) => (
          <button
            type="button"
            key={each.theme}
            aria-pressed={each.theme === theme}
            onClick={() => setTheme(each.theme)}
          >
            {each.word}
          </button>
        ))}
      </div>
      <div className={classNames('hs-theme hs-level', size)} role="group" aria-label="Dark-room level">
        {levels.map((each) => (
          <Tip key={each.level} words={each.help}>
            <button type="button" aria-pressed={each.level === level} onClick={() => setLevel(each.level)}>
              {each.level}
            </button>
          </Tip>
        ))}
      </div>
    </>
  )
}

/** On a phone there is room for one button: it names the present theme and a press goes on to the next. */
export function ThemeNext() {
  const { theme, setTheme } = useTheme()
  const at = themes.findIndex((each) => each.theme === theme)
  const next = themes[(at + 1) % themes.length] ?? themes[0]!
  return (
    <div className="hs-theme hs-theme-next">
      <button
        type="button"
        aria-label={`Screen light: ${themes[at]?.word ?? 'Day'}. Change to ${next.word}`}
        onClick={() => setTheme(next.theme)}
      >
        {themes[at]?.word ?? 'Day'}
      </button>
    </div>
  )
}
