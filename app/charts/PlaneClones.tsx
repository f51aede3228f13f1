import { useEffect, useLayoutEffect, useRef } from 'react';
import { useDesk } from '../store/context';
import { usePalette } from '../theme/palette';
import type { CloneCloud } from '../worker/clone-cloud';
import type { Projection } from './plane-geometry';
import { cloneStamps, type Picture, printClones, scaledProjection, wiped } from './plane-stamp';

/** Pixels of the layer to a CSS pixel at most: more would cost a frame and show nothing. */
const FINEST = 1.5;

/** The clones under the drawing; those that stream in are added without a new render. */
export function PlaneClones(props: {
  cloud: CloneCloud;
  project: Projection;
  leftPx: number;
  widthPx: number;
  heightPx: number;
}) {
  const { cloud, project, leftPx, widthPx, heightPx } = props;
  const { store } = useDesk();
  const { object } = usePalette();
  const canvas = useRef<HTMLCanvasElement>(null);
  /** The pixels, kept from drawing to drawing of one size. */
  const kept = useRef<ImageData | null>(null);
  const add = useRef<() => void>(() => {});

  useLayoutEffect(() => {
    const element = canvas.current;
    const context = element?.getContext('2d') ?? null;
    if (element === null || context === null) return;
    const scale = Math.min(devicePixelRatio, FINEST);
    const size = [Math.round(widthPx * scale), Math.round(heightPx * scale)] as const;
    if (element.width !== size[0]) element.width = size[0];
    if (element.height !== size[1]) element.height = size[1];
    if (kept.current?.width !== size[0] || kept.current.height !== size[1]) {
      kept.current = context.createImageData(...size);
    }
    const image = kept.current;
    const picture: Picture = { widthPx: size[0], heightPx: size[1], data: image.data };
    const stamps = cloneStamps(scale);
    const onto = scaledProjection(project, scale);
    const printed = { plain: 0, rare: 0 };
    wiped(picture, object);
    add.current = () => {
      for (const drawn of ['plain', 'rare'] as const) {
        const points = cloud.points(drawn);
        printClones(picture, points.subarray(printed[drawn]), stamps[drawn], onto);
        printed[drawn] = points.length;
      }
      context.putImageData(image, 0, 0);
    };
    add.current();
  }, [cloud, project, widthPx, heightPx, object]);

  useEffect(() => {
    let frame = 0;
    let version = cloud.version;
    const leave = store.subscribe(() => {
      if (cloud.version === version || frame !== 0) return;
      frame = requestAnimationFrame(() => {
        frame = 0;
        version = cloud.version;
        add.current();
      });
    });
    return () => {
      leave();
      cancelAnimationFrame(frame);
    };
  }, [cloud, store]);

  return (
    <canvas
      ref={canvas}
      className="plane-clones"
      style={{ left: leftPx, width: widthPx, height: heightPx }}
    />
  );
}
