/** Paints for the colour names of IEC 60062, as they look on a printed part. */
export const bandColours: Record<string, string> = {
  black: '#1d1d1b',
  brown: '#7a4520',
  red: '#bf2b2b',
  orange: '#e5741c',
  yellow: '#f0c61a',
  green: '#2e8b45',
  blue: '#2459a9',
  violet: '#7c4aa3',
  grey: '#8b8d8f',
  white: '#f7f6f1',
  gold: '#b08a2e',
  silver: '#b7bbbe',
  pink: '#e29ab0',
};

export const ledPaints: Record<string, string> = {
  red: '#d2362f',
  orange: '#ea7a1f',
  yellow: '#ecc21c',
  green: '#38a052',
  blue: '#2f6fd0',
};
