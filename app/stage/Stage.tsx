import { useDeskStore } from '../store/context';
import { SceneView } from './SceneView';
import './stage.css';

/** Both scenes on one clock, side by side or one of them alone. */
export default function Stage() {
  const layout = useDeskStore((state) => state.stageLayout);
  return (
    <div className="stage">
      <SceneView scene="sun" hidden={layout === 'earth'} />
      <SceneView scene="earth" hidden={layout === 'sun'} />
    </div>
  );
}
