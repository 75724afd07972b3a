export function SetOutPanel() {
  return null;
}
