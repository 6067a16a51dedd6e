// While a run is under way, fetches the page again every two seconds and puts in what changed; where the network or the
// server fails for a while it goes on asking. Without this script the page's link does the same.
const PAUSE = 2000;
const state = document.getElementById("run-state");

function takeOver(page) {
  document.querySelectorAll("[id^='progress-'], [id^='finished-'], [id^='state-'], #run-stocks").forEach(old => {
    const fresh = page.getElementById(old.id);
    // what somebody is in stays as it is, so that no focus is lost
    if (fresh && !old.contains(document.activeElement) && old.innerHTML !== fresh.innerHTML) old.replaceWith(fresh);
  });
}

// the page anew; null where it cannot be had at present
async function fetched() {
  try {
    const answer = await fetch(location.href, { credentials: "same-origin" });
    return answer.status < 500 ? new DOMParser().parseFromString(await answer.text(), "text/html") : null;
  } catch {
    return null;
  }
}

async function look() {
  const page = await fetched();
  if (!page) {
    setTimeout(look, PAUSE);
    return;
  }
  const now = page.getElementById("run-state");
  // another page, such as the one to sign in
  if (!now) return;
  takeOver(page);
  if (now.dataset.active === "true") {
    setTimeout(look, PAUSE);
  } else {
    state.textContent = state.dataset.over;
    document.querySelectorAll("form[action$='/cancel'], #run-refresh").forEach(element => element.remove());
  }
}

if (state?.dataset.active === "true") setTimeout(look, PAUSE);
