// Server-sent events: what is new, and whether the line to the monitor holds.

// The monitor says something at least every 15 s.
const longestSilence = 40000;

// Calls changed(change) at every event, and lost(since) or back() when the line goes and comes.
export function listen({ changed, lost, back }) {
  let source = null;
  let last = Date.now();
  let live = false;

  function heard() {
    last = Date.now();
    if (!live) {
      live = true;
      back();
    }
  }
  function gone() {
    if (live) {
      live = false;
      lost();
    }
  }
  function open() {
    source?.close();
    source = new EventSource("/api/v1/events");
    source.addEventListener("change", (event) => {
      heard();
      changed(JSON.parse(event.data));
    });
    source.addEventListener("alive", heard);
    source.addEventListener("error", gone);
  }

  open();
  setInterval(() => {
    const silent = Date.now() - last > longestSilence;
    if (silent) {
      gone();
    }
    if (silent || source.readyState === EventSource.CLOSED) {
      last = Date.now();
      open();
    }
  }, 5000);
}
