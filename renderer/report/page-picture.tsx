import type { PDFDocumentProxy } from 'pdfjs-dist';
import { type ReactElement, useEffect, useRef, useState } from 'react';
import { drawPage, pageText } from './open-pages.ts';
import css from './report.module.css';

export interface PagePictureProps {
  readonly pages: PDFDocumentProxy;
  readonly number: number;
  /** Height over width, until the page itself is known. */
  readonly shape: number;
}

/** One page as it will print; drawn when it comes near the view, and again when its width changes. */
export function PagePicture({ pages, number, shape }: PagePictureProps): ReactElement {
  const canvas = useRef<HTMLCanvasElement>(null);
  const [widthPx, setWidthPx] = useState(0);
  const [isNear, setNear] = useState(false);
  const [text, setText] = useState('');
  useEffect(() => {
    const element = canvas.current!;
    const size = new ResizeObserver(() => setWidthPx(Math.round(element.clientWidth * devicePixelRatio)));
    const near = new IntersectionObserver(([entry]) => entry!.isIntersecting && setNear(true), {
      rootMargin: '600px',
    });
    size.observe(element);
    near.observe(element);
    return () => {
      size.disconnect();
      near.disconnect();
    };
  }, []);
  useEffect(() => {
    if (!isNear || widthPx === 0) return;
    void drawPage(pages, number, canvas.current!, widthPx);
  }, [pages, number, isNear, widthPx]);
  useEffect(() => {
    if (!isNear) return;
    let isCurrent = true;
    void pageText(pages, number).then((words) => isCurrent && setText(words));
    return () => {
      isCurrent = false;
    };
  }, [pages, number, isNear]);
  return (
    <figure className={css.page}>
      <canvas
        ref={canvas}
        className={css.paper}
        style={{ aspectRatio: `1 / ${shape}` }}
        role="img"
        aria-label={`Page ${number} of ${pages.numPages}${text === '' ? '' : `: ${text}`}`}
      />
      <figcaption>
        {number} of {pages.numPages}
      </figcaption>
    </figure>
  );
}
