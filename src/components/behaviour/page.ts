/** What pages do beyond HTML: switch the theme, copy a text, add the reader's own time to a time in UTC. */

const copiedFor = 2000;

function isDark(): boolean {
  const { theme } = document.documentElement.dataset;
  return theme ? theme === 'dark' : matchMedia('(prefers-color-scheme: dark)').matches;
}

function switchTheme(): void {
  const theme = isDark() ? 'light' : 'dark';
  document.documentElement.dataset.theme = theme;
  try {
    localStorage.setItem('theme', theme);
  } catch {
    // Not remembered, but switched.
  }
}

async function copy(button: HTMLElement, text: string): Promise<void> {
  const words = button.textContent;
  try {
    await navigator.clipboard.writeText(text);
    button.textContent = 'Copied';
  } catch {
    button.textContent = 'Not copied';
  }
  button.dataset.state = 'done';
  setTimeout(() => {
    button.textContent = words;
    delete button.dataset.state;
  }, copiedFor);
}

document.addEventListener('click', (event) => {
  const button = event.target instanceof Element ? event.target.closest('button') : null;
  if (button?.dataset.action === 'theme') switchTheme();
  const text = button?.dataset.copy;
  if (button && text && button.dataset.state !== 'done') void copy(button, text);
});

/** Adds the reader's own time where it differs: "07:00 UTC (09:00 your time)". */
function addLocalTime(time: HTMLTimeElement): void {
  const at = new Date(time.dateTime);
  if (Number.isNaN(at.getTime()) || at.getTimezoneOffset() === 0) return;
  const sameDay = at.getDate() === at.getUTCDate();
  const local = new Intl.DateTimeFormat('en-GB', {
    ...(sameDay ? {} : { day: 'numeric', month: 'short' }),
    hour: '2-digit',
    minute: '2-digit',
  });
  const note = document.createElement('span');
  note.className = 'your-time';
  note.textContent = ` (${local.format(at)} your time)`;
  time.append(note);
}

document.querySelectorAll<HTMLTimeElement>('time[data-local]').forEach(addLocalTime);
