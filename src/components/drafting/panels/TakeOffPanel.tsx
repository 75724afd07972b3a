export function TakeOffPanel() {
  return null;
}
