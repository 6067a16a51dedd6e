// Adds lines to the landing form beyond the three that stand in the page. Without this script the three remain.
const lines = document.getElementById('lines');
const most = Number(lines?.dataset.most);

function renumber(element, index) {
  for (const name of ['id', 'name', 'for', 'aria-describedby']) {
    const value = element.getAttribute(name);
    if (value) element.setAttribute(name, value.replace(/lines(\[?)\d+/g, `lines$1${index}`));
  }
}

function add() {
  const index = lines.querySelectorAll('fieldset').length;
  const line = lines.querySelector('fieldset').cloneNode(true);
  line.querySelectorAll('.error').forEach(error => error.remove());
  line.querySelectorAll('*').forEach(element => renumber(element, index));
  line.querySelectorAll('input').forEach(input => { input.value = ''; input.removeAttribute('aria-invalid'); });
  line.querySelector('select').value = '';
  line.querySelector('legend').textContent = line.querySelector('legend').textContent.replace(/\d+/, index + 1);
  const more = lines.querySelector(':scope > details');
  more.append(line);
  more.open = true;
  line.querySelector('select').focus();
  button.hidden = index + 1 >= most;
}

const button = document.createElement('button');
if (lines && most) {
  button.type = 'button';
  button.className = 'quiet';
  button.textContent = lines.dataset.add;
  button.addEventListener('click', add);
  lines.after(button);
}
