// While a run is under way, fetches the page again every two seconds and puts in what changed. Without this script the
// page's link does the same.
const PAUSE = 2000;
const state = document.getElementById("run-state");

function takeOver(page) {
  document.querySelectorAll("[id^='progress-'], [id^='finished-'], [id^='state-'], #run-stocks").forEach(old => {
    const fresh = page.getElementById(old.id);
    // what somebody is in stays as it is, so that no focus is lost
    if (fresh && !old.contains(document.activeElement) && old.innerHTML !== fresh.innerHTML) old.replaceWith(fresh);
  });
}

async function look() {
  const answer = await fetch(location.href, { credentials: "same-origin" });
  if (!answer.ok || answer.redirected) return;
  const page = new DOMParser().parseFromString(await answer.text(), "text/html");
  const now = page.getElementById("run-state");
  if (!now) return;
  takeOver(page);
  if (now.dataset.active === "true") {
    setTimeout(look, PAUSE);
  } else {
    state.textContent = state.dataset.over;
    document.querySelectorAll("form[action$='/cancel']").forEach(form => form.remove());
  }
}

if (state?.dataset.active === "true") setTimeout(look, PAUSE);
