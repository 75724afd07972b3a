export function LevelsPanel() {
  return null;
}
