/** Diagonal hatching in a tone: what marks the rival's bands and areas apart from colour. */
import { markColour } from '@/app/_lib/tone';
import type { Tone } from '@/lib/brief/types';

const SPACING = 6;

export function HatchPattern({ id, tone, opacity = 0.45 }: { id: string; tone: Tone; opacity?: number }) {
  return (
    <pattern
      id={id}
      width={SPACING}
      height={SPACING}
      patternUnits="userSpaceOnUse"
      patternTransform="rotate(45)"
    >
      <line
        x1={0}
        y1={0}
        x2={0}
        y2={SPACING}
        stroke={markColour(tone)}
        strokeWidth={1.1}
        strokeOpacity={opacity}
      />
    </pattern>
  );
}
