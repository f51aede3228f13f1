import { createRoot, type ReconcilerRoot, type RootState } from '@react-three/fiber';
import { WebGLRenderer } from 'three';
import type { SceneName } from '../plate/scene-source';
import { Painter } from './painter';
import { SceneObjects } from './SceneObjects';

/** Whether a scene can be drawn: WebGL is there, was never there, or has been taken away. */
export type Drawing = 'drawn' | 'missing' | 'lost';

interface SurfaceEvents {
  /** Called before each frame, to fill the painter. */
  frame(painter: Painter): void;
  drawing(drawing: Drawing): void;
}

/** No depth buffer: what hides what is worked out exactly. No multisampling: lines fade by themselves. */
const CONTEXT: WebGLContextAttributes = {
  alpha: false,
  antialias: false,
  depth: false,
  stencil: false,
  powerPreference: 'high-performance',
};

/** A canvas with a scene's meshes on it; starts in several short tasks, none of which holds the page. */
export class Surface {
  private readonly canvas = document.createElement('canvas');
  private root: ReconcilerRoot<HTMLCanvasElement> | null = null;
  private state: RootState | null = null;
  private painter: Painter | null = null;
  private widthPx = 0;
  private heightPx = 0;
  private pixelRatio = 1;
  private ground = '#ffffff';
  private gone = false;

  constructor(
    host: HTMLElement,
    scene: SceneName,
    private readonly events: SurfaceEvents,
  ) {
    this.canvas.className = 'scene-canvas';
    host.append(this.canvas);
    void this.start(scene);
  }

  private async start(scene: SceneName): Promise<void> {
    await nextTask();
    if (this.gone) return;
    const context = this.canvas.getContext('webgl2', CONTEXT);
    if (context === null) {
      this.events.drawing('missing');
      return;
    }
    this.canvas.addEventListener('webglcontextlost', this.lose);
    this.canvas.addEventListener('webglcontextrestored', this.regain);
    await nextTask();
    if (this.gone) return;
    const painter = new Painter(scene);
    this.painter = painter;
    await nextTask();
    if (this.gone) return;
    const { canvas } = this;
    const root = createRoot(canvas);
    this.root = root;
    await root.configure({
      gl: () => new WebGLRenderer({ canvas, context, ...CONTEXT }),
      // The first frame is drawn by hand, below.
      frameloop: 'never',
      flat: true,
      dpr: this.pixelRatio,
      size: {
        width: Math.max(1, this.widthPx),
        height: Math.max(1, this.heightPx),
        top: 0,
        left: 0,
      },
    });
    if (this.gone) return;
    const frame = () => this.events.frame(painter);
    const store = root.render(<SceneObjects painter={painter} beforeFrame={frame} />);
    await nextTask();
    if (this.gone) return;
    const state = store.getState();
    state.gl.compile(state.scene, state.camera);
    await nextTask();
    if (this.gone) return;
    this.state = state;
    this.apply();
    // The first frame runs code that has never run: its two halves are tasks of their own.
    frame();
    await nextTask();
    if (this.gone) return;
    state.gl.render(state.scene, state.camera);
    state.setFrameloop('demand');
    this.invalidate();
    this.events.drawing('drawn');
  }

  dispose(): void {
    this.gone = true;
    this.canvas.removeEventListener('webglcontextlost', this.lose);
    this.canvas.removeEventListener('webglcontextrestored', this.regain);
    this.root?.unmount();
    this.painter?.dispose();
    this.canvas.remove();
  }

  invalidate(): void {
    if (this.widthPx > 0) this.state?.invalidate();
  }

  setSize(widthPx: number, heightPx: number): void {
    this.widthPx = widthPx;
    this.heightPx = heightPx;
    this.apply();
  }

  setPixelRatio(pixelRatio: number): void {
    this.pixelRatio = pixelRatio;
    this.state?.setDpr(pixelRatio);
  }

  setGround(colour: string): void {
    this.ground = colour;
    this.apply();
  }

  /** The page's type has arrived: words are written anew. */
  rewrite(): void {
    this.painter?.stamps.lettering.clear();
    this.invalidate();
  }

  /**
   * A picture of another size; the screen is drawn again before it can be seen.
   *
   * @param fill  fills the painter for the picture
   * @returns     null when nothing can be drawn now
   */
  picture(
    widthPx: number,
    heightPx: number,
    ground: string,
    fill: (painter: Painter) => void,
  ): HTMLCanvasElement | null {
    const { state, painter } = this;
    const out = document.createElement('canvas');
    out.width = widthPx;
    out.height = heightPx;
    const context = out.getContext('2d');
    if (state === null || painter === null || context === null) return null;
    const { gl, scene, camera } = state;
    if (gl.getContext().isContextLost()) return null;
    gl.setPixelRatio(1);
    gl.setSize(widthPx, heightPx, false);
    gl.setClearColor(ground);
    fill(painter);
    gl.render(scene, camera);
    context.drawImage(gl.domElement, 0, 0, widthPx, heightPx);
    gl.setPixelRatio(this.pixelRatio);
    gl.setSize(Math.max(1, this.widthPx), Math.max(1, this.heightPx), false);
    gl.setClearColor(this.ground);
    this.events.frame(painter);
    gl.render(scene, camera);
    return out;
  }

  private apply(): void {
    const { state, widthPx, heightPx } = this;
    if (state === null) return;
    state.gl.setClearColor(this.ground);
    if (widthPx > 0 && heightPx > 0) {
      state.setDpr(this.pixelRatio);
      state.setSize(widthPx, heightPx);
    }
    this.invalidate();
  }

  private readonly lose = (event: Event): void => {
    event.preventDefault();
    this.events.drawing('lost');
  };

  private readonly regain = (): void => {
    this.events.drawing('drawn');
    this.apply();
  };
}

function nextTask(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve));
}
