/** Two digits with the minus sign that everything else is printed with. */
export const plainScore = (value: number): string => {
  const text = Math.abs(value).toFixed(2);
  return value < 0 && Number(text) !== 0 ? `−${text}` : text;
};
