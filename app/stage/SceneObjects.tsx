import { useFrame } from '@react-three/fiber';
import type { Painter } from './painter';

/** The few meshes of a scene; what they hold is written before each frame. */
export function SceneObjects(props: { painter: Painter; beforeFrame(): void }) {
  const { painter, beforeFrame } = props;
  useFrame(beforeFrame);
  return (
    <>
      {painter.globes.map(({ mesh }) => (
        <primitive key={mesh.id} object={mesh} />
      ))}
      <primitive object={painter.lines.mesh} />
      <primitive object={painter.stamps.mesh} />
    </>
  );
}
