/** A percentage as the trade writes it, with a true minus sign: `2 %`, `-1.8 %` becomes `−1.8 %`. `digits` fixes the places after the point. */
export function formatPercent(percent: number, digits?: number): string {
  const text = digits === undefined ? String(Number(percent.toFixed(4))) : percent.toFixed(digits)
  return `${text.replace('-', '−')} %`
}
