import { Camera, Cylinder, type Geometry, Mesh, Program, Renderer, Sphere, Transform } from "ogl";
import type { Vector, View } from "../svg/space.js";

/** A ball, a stick or a cone: its middle, its length as a vector (of a ball: its radius) and its thickness. */
export interface Solid {
  readonly shape: "ball" | "stick" | "cone";
  readonly centre: Vector;
  readonly along: Vector;
  readonly radius: number;
  readonly colour: Vector;
}

/** Solids on a canvas, seen from far away. */
export interface SolidsView {
  readonly fill: (solids: readonly Solid[]) => void;
  /** `reach`: half of the smaller side of the canvas, in the unit of the solids. */
  readonly draw: (view: View, reach: number) => void;
  readonly resize: () => void;
}

const vertex = `
attribute vec3 position;
attribute vec3 normal;
attribute vec3 centre;
attribute vec3 along;
attribute vec3 colour;
attribute float radius;
uniform mat4 modelViewMatrix;
uniform mat4 projectionMatrix;
varying vec3 vNormal;
varying vec3 vColour;
void main() {
  vec3 y = normalize(along);
  vec3 x = normalize(cross(abs(y.z) < 0.9 ? vec3(0.0, 0.0, 1.0) : vec3(1.0, 0.0, 0.0), y));
  vec3 z = cross(x, y);
  vec3 place = centre + position.x * radius * x + position.y * along + position.z * radius * z;
  vNormal = mat3(modelViewMatrix) * (mat3(x, y, z) * normal);
  vColour = colour;
  gl_Position = projectionMatrix * modelViewMatrix * vec4(place, 1.0);
}`;

const fragment = `
precision highp float;
varying vec3 vNormal;
varying vec3 vColour;
void main() {
  float light = 0.55 + 0.5 * max(0.0, dot(normalize(vNormal), normalize(vec3(0.35, 0.55, 0.8))));
  gl_FragColor = vec4(vColour * light, 1.0);
}`;

/** The view of a canvas; throws where the browser has no WebGL. */
export function solidsView(canvas: HTMLCanvasElement): SolidsView {
  const renderer = new Renderer({
    canvas,
    alpha: true,
    antialias: true,
    dpr: Math.min(devicePixelRatio, 2),
    // So that the picture can be printed and copied.
    preserveDrawingBuffer: true,
  });
  const { gl } = renderer;
  gl.clearColor(0, 0, 0, 0);
  const camera = new Camera(gl);
  const root = new Transform();
  root.matrixAutoUpdate = false;
  const program = new Program(gl, { vertex, fragment, cullFace: false });
  const shapes = {
    ball: () => new Sphere(gl, { radius: 1, widthSegments: 20, heightSegments: 14 }),
    stick: () => new Cylinder(gl, { radiusTop: 1, radiusBottom: 1, height: 1, radialSegments: 14 }),
    cone: () => new Cylinder(gl, { radiusTop: 0, radiusBottom: 1, height: 1, radialSegments: 18 }),
  };
  let ratio = 1;
  return {
    fill: (solids) => {
      for (const child of [...root.children]) {
        (child as Mesh).geometry.remove();
        child.setParent(null);
      }
      for (const shape of ["ball", "stick", "cone"] as const) {
        const own = solids.filter((solid) => solid.shape === shape);
        if (own.length === 0) continue;
        const geometry = withInstances(shapes[shape](), own);
        new Mesh(gl, { geometry, program, frustumCulled: false }).setParent(root);
      }
    },
    draw: ({ right, up, towards }, reach) => {
      // Columns of the matrix are the images of x, y, z; the eye looks along −z.
      root.matrix.set(
        ...([
          right[0],
          up[0],
          towards[0],
          0,
          right[1],
          up[1],
          towards[1],
          0,
          right[2],
          up[2],
          towards[2],
          0,
          0,
          0,
          0,
          1,
        ] as const),
      );
      root.worldMatrixNeedsUpdate = true;
      const [x, y] = ratio >= 1 ? [reach * ratio, reach] : [reach, reach / ratio];
      camera.orthographic({ left: -x, right: x, top: y, bottom: -y, near: 0.1, far: 40 * reach });
      camera.position.set(0, 0, 20 * reach);
      renderer.render({ scene: root, camera });
    },
    resize: () => {
      const { clientWidth: width, clientHeight: height } = canvas.parentElement ?? canvas;
      renderer.setSize(width, height);
      ratio = width / Math.max(1, height);
    },
  };
}

function withInstances(geometry: Geometry, solids: readonly Solid[]): Geometry {
  const vectors = (of: (solid: Solid) => Vector) => ({
    instanced: 1,
    size: 3,
    data: new Float32Array(solids.flatMap((solid) => [...of(solid)])),
  });
  geometry.addAttribute(
    "centre",
    vectors(({ centre }) => centre),
  );
  geometry.addAttribute(
    "along",
    vectors(({ along }) => along),
  );
  geometry.addAttribute(
    "colour",
    vectors(({ colour }) => colour),
  );
  geometry.addAttribute("radius", {
    instanced: 1,
    size: 1,
    data: new Float32Array(solids.map(({ radius }) => radius)),
  });
  return geometry;
}
