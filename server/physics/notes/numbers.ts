/** A share for a sentence, as per cent with two digits. */
export const percent = (share: number): string => `${Number((100 * share).toPrecision(2))} %`

/** A number for a sentence, three digits. */
export const brief = (x: number): string => String(Number(x.toPrecision(3)))
