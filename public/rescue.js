// The way back from a broken deployment: works without the app. The database is not touched.
const answer = document.getElementById('answer');

async function removeKeptProgram() {
  const registrations = (await navigator.serviceWorker?.getRegistrations()) ?? [];
  await Promise.all(registrations.map((registration) => registration.unregister()));
  await Promise.all((await caches.keys()).map((name) => caches.delete(name)));
  answer.textContent = 'Removed. Open the app while online.';
}

document.getElementById('go').addEventListener('click', () => {
  removeKeptProgram().catch((error) => {
    answer.textContent = `That failed: ${error}`;
  });
});
