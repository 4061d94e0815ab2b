import { ref, watch, type Ref } from 'vue';

function stored(key: string): string {
  try {
    return sessionStorage.getItem(key) ?? '';
  } catch {
    // Storage may be closed to this page; the text then lives as long as the page.
    return '';
  }
}

function store(key: string, text: string): void {
  try {
    if (text === '') sessionStorage.removeItem(key);
    else sessionStorage.setItem(key, text);
  } catch {
    // Kept for this page only.
  }
}

/** Text that is kept in this tab of the browser while its page is left; empty text is forgotten. */
export function useKeptText(key: string): Ref<string> {
  const text = ref(stored(key));
  watch(text, (now) => store(key, now));
  return text;
}
