// Which page is open: the part of the address behind `#/`, so that a page can be bookmarked and served from any folder.

/** Follows the address for as long as the returned stop function has not been called. */
export class Route {
  page = $state(pageOf(location.hash));

  follow(): () => void {
    const onChange = (): void => {
      this.page = pageOf(location.hash);
    };
    addEventListener('hashchange', onChange);
    return () => {
      removeEventListener('hashchange', onChange);
    };
  }
}

function pageOf(hash: string): string {
  return hash.replace(/^#\/?/, '').split('?')[0] || 'tonight';
}
