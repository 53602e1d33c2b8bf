/** Inches where they are at home, millimetres elsewhere. */
export const curveUnit = (locale: string): "in" | "mm" => (/-(US|CA|GB)$/i.test(locale) ? "in" : "mm");
