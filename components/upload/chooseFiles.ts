/** Opens the machine's file chooser; resolves with nothing when the person changes their mind. */
export function chooseFiles({ several = true } = {}): Promise<File[]> {
  return new Promise((resolve) => {
    const input = document.createElement('input');
    input.type = 'file';
    input.multiple = several;
    input.accept = '.fits,.fit,.fts,.gz,.fz,image/fits,application/fits,application/gzip';
    input.setAttribute('aria-label', 'FITS files');
    input.style.display = 'none';
    const finish = () => {
      resolve(Array.from(input.files ?? []));
      input.remove();
    };
    input.addEventListener('change', finish, { once: true });
    input.addEventListener('cancel', finish, { once: true });
    document.body.append(input); // some browsers open it only when it is in the page
    input.click();
  });
}
