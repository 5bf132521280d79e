import { useId, type ComponentPropsWithRef, type ReactNode } from 'react'
import { Link, type LinkProps } from 'react-router-dom'
import { classNames } from './class-names.ts'
import { Icon, type IconName } from './icon.tsx'

type Look = {
  /** At most one primary button in a region. */
  kind?: 'plain' | 'primary' | 'danger' | 'quiet'
  size?: 'small' | 'usual' | 'large'
  icon?: IconName
}

function buttonClass({ kind = 'plain', size = 'usual' }: Look, more?: string): string {
  return classNames(
    'hs-button',
    kind !== 'plain' && `hs-button-${kind}`,
    size !== 'usual' && `hs-button-${size}`,
    more,
  )
}

type ButtonProps = Look &
  Omit<ComponentPropsWithRef<'button'>, 'disabled'> & {
    /** Why the act is not possible now, in words; null or absent when it is. Shown beside the button. */
    disabledReason?: string | null
    /** Locked for the moment while the act runs; needs no reason, the words of the button say it. */
    busy?: boolean
  }

/**
 * A button. A disabled one stays reachable by keyboard (aria-disabled), so that its reason can be read.
 */
export function Button({
  kind,
  size,
  icon,
  disabledReason,
  busy,
  className,
  children,
  onClick,
  ...rest
}: ButtonProps) {
  const reasonId = useId()
  const off = Boolean(disabledReason) || Boolean(busy)
  const button = (
    <button
      type="button"
      {...rest}
      className={buttonClass({ kind, size }, className)}
      aria-disabled={off || undefined}
      aria-busy={busy || undefined}
      aria-describedby={disabledReason ? reasonId : rest['aria-describedby']}
      onClick={(event) => (off ? event.preventDefault() : onClick?.(event))}
    >
      {icon && <Icon name={icon} size={17} />}
      {children}
    </button>
  )
  if (!disabledReason) return button
  return (
    <span className="hs-with-reason">
      {button}
      <span className="hs-reason" id={reasonId}>
        {disabledReason}
      </span>
    </span>
  )
}

/** A place to go that looks like a button. */
export function ButtonLink({ kind, size, icon, className, children, ...rest }: Look & LinkProps) {
  return (
    <Link {...rest} className={buttonClass({ kind, size }, className)}>
      {icon && <Icon name={icon} size={17} />}
      {children}
    </Link>
  )
}

/** A place to go, in running text or a table. */
export function TextLink({ className, ...rest }: LinkProps) {
  return <Link {...rest} className={classNames('hs-link', className)} />
}

/** An act in the form of words, for the quiet acts beside a result. */
export function TextButton({
  danger,
  className,
  children,
  ...rest
}: ComponentPropsWithRef<'button'> & { danger?: boolean; children: ReactNode }) {
  return (
    <button type="button" {...rest} className={classNames('hs-link', danger && 'hs-link-danger', className)}>
      {children}
    </button>
  )
}
