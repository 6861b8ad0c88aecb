//! Exact ray tracing in three dimensions, as a second road to every ray matrix.
//!
//! Nothing here knows a ray matrix, and nothing here uses the crate under test. A [`Bench`] is
//! built along a chief ray; each part becomes a real surface (or a real index profile) standing in
//! space. Rays beside the chief ray are intersected with those surfaces, reflected by the vector
//! law of reflection and refracted by the vector law of Snell; only the *differences* of traced
//! rays make a matrix.
//!
//! Conventions: lengths in metres, angles in radians, a flat surface has the radius
//! `f64::INFINITY`. The frame (t, s, k) is right-handed with t = s × k; it starts with t to the
//! left, s up and k forward, and is carried along as a pilot carries it: turned with the beam in
//! the plane of incidence, never mirrored. A *side* is an angle from left through up, as the pilot
//! sees it: [`LEFT`], [`UP`], [`RIGHT`], [`DOWN`] or anything between. Matrices act on
//! (x_t, x_s, p_t, p_s) with p the optical direction cosine, index times direction component.

use std::f64::consts::{FRAC_PI_2, PI};

use nalgebra::{Matrix3, Matrix4, Vector3, Vector4};

type Vector = Vector3<f64>;

pub const LEFT: f64 = 0.0;
pub const UP: f64 = FRAC_PI_2;
pub const RIGHT: f64 = PI;
pub const DOWN: f64 = 1.5 * PI;

/// What [`deviation`] may be between a traced matrix and a closed form.
///
/// The rays stand a thousandth of the tightest radius, focal length or 1/γ off the axis. The
/// seven-point difference leaves the sixth power of that times the rays' own aberration; the
/// rounding of positions, 1e-16 of the path, is divided by the step. The two balance: benches of a
/// few tightest lengths come to 6e-13 in the tests below, five metres through radii of 0.1 m to
/// 3e-11. The rest is reserve; a wrong cosine or sign is off by a thousandth or more.
pub const ACCURACY: f64 = 1e-9;

/// Displacement of the neighbouring rays, relative to the tightest length on the bench: small enough
/// for a face met near the critical angle, where aberrations are strong.
const STEP: f64 = 2e-4;

/// The carried frame: t to the pilot's left, s up, k ahead; t = s × k.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Frame {
    pub t: Vector,
    pub s: Vector,
    pub k: Vector,
}

impl Frame {
    fn start() -> Self {
        Self {
            t: Vector::y(),
            s: Vector::z(),
            k: Vector::x(),
        }
    }

    /// The right-handed frame of exact unit vectors nearest to (s, k): without it each turn would
    /// triple the rounding of the turn before.
    fn squared(s: Vector, k: Vector) -> Self {
        let k = k.normalize();
        let s = (s - k * s.dot(&k)).normalize();
        Self {
            t: s.cross(&k),
            s,
            k,
        }
    }

    /// The direction square to the beam on the given side.
    pub fn toward(&self, side: f64) -> Vector {
        self.t * side.cos() + self.s * side.sin()
    }

    /// The frame after the beam has turned by `angle` to the given side.
    fn turned(&self, side: f64, angle: f64) -> Self {
        let inward = self.toward(side);
        let across = self.k.cross(&inward);
        let turn = |v: Vector| {
            let (ahead, aside) = (v.dot(&self.k), v.dot(&inward));
            self.k * (ahead * angle.cos() - aside * angle.sin())
                + inward * (ahead * angle.sin() + aside * angle.cos())
                + across * v.dot(&across)
        };
        Self::squared(turn(self.s), turn(self.k))
    }

    /// The frame turned by the shortest rotation that takes its k onto `ahead`.
    fn aligned(&self, ahead: Vector) -> Self {
        let sum = self.k + ahead;
        let turn = |v: Vector| {
            v - sum * (v.dot(&sum) / (1.0 + self.k.dot(&ahead))) + ahead * (2.0 * v.dot(&self.k))
        };
        Self::squared(turn(self.s), turn(self.k))
    }
}

#[derive(Clone, Copy)]
struct Ray {
    at: Vector,
    direction: Vector,
}

impl Ray {
    fn advanced(&self, distance: f64) -> Self {
        Self {
            at: self.at + self.direction * distance,
            ..*self
        }
    }

    /// The ray where it crosses the plane through `point` square to `normal`.
    fn on_plane(&self, point: Vector, normal: Vector) -> Self {
        self.advanced((point - self.at).dot(&normal) / self.direction.dot(&normal))
    }
}

/// A surface r·N = ½ r·K r about its vertex: a plane (K = 0), an exact sphere (K = c·1), or the
/// quadric with the sag κ_x x²/2 + κ_y y²/2 along N (K = κ_x xxᵀ + κ_y yyᵀ).
struct Surface {
    vertex: Vector,
    normal: Vector,
    curvature: Matrix3<f64>,
}

impl Surface {
    fn plane(vertex: Vector, normal: Vector) -> Self {
        Self::sphere(vertex, normal, f64::INFINITY)
    }

    /// The centre lies at `radius` along the normal.
    fn sphere(vertex: Vector, normal: Vector, radius: f64) -> Self {
        Self {
            vertex,
            normal,
            curvature: Matrix3::identity() / radius,
        }
    }

    /// The ray where it meets the surface near its vertex, and the unit normal there.
    ///
    /// The quadratic is set up from the vertex plane, where its wanted root is the small one, and
    /// that root is written without the subtraction of nearly equal numbers: a long radius is as
    /// good as a short one, and a flat surface needs no case of its own.
    fn met_by(&self, ray: &Ray) -> (Ray, Vector) {
        let near = ray.on_plane(self.vertex, self.normal);
        let r = near.at - self.vertex;
        let d = near.direction;
        let bent = self.curvature * d;
        // ½ (d·K d) l² − (d·N − r·K d) l + (½ r·K r − r·N) = 0
        let slope = d.dot(&self.normal) - r.dot(&bent);
        let sag = r.dot(&(self.curvature * r)) - 2.0 * r.dot(&self.normal);
        let discriminant = slope * slope - d.dot(&bent) * sag;
        assert!(discriminant >= 0.0, "the ray misses the surface");
        let met = near.advanced(sag / (slope + discriminant.sqrt().copysign(slope)));
        let normal = self.normal - self.curvature * (met.at - self.vertex);
        (met, normal.normalize())
    }
}

fn reflected(direction: Vector, normal: Vector) -> Vector {
    direction - normal * (2.0 * direction.dot(&normal))
}

fn refracted(direction: Vector, normal: Vector, before: f64, after: f64) -> Vector {
    let ratio = before / after;
    let cosine = direction.dot(&normal);
    let beyond = 1.0 - ratio * ratio * (1.0 - cosine * cosine);
    assert!(beyond > 0.0, "total internal reflection");
    direction * ratio + normal * (beyond.sqrt().copysign(cosine) - ratio * cosine)
}

/// The angle of a ray to the normal behind a surface.
pub fn angle_behind(aoi: f64, before: f64, after: f64) -> f64 {
    (before * aoi.sin() / after).asin()
}

/// A length of graded index n0 (1 − γ_t² x_t²/2 − γ_s² x_s²/2) between flat faces square to the
/// chief ray.
struct Duct {
    at: Vector,
    frame: Frame,
    index: f64,
    gamma2: [f64; 2],
    length: f64,
    steps: usize,
}

impl Duct {
    fn profile(&self, x: [f64; 2]) -> f64 {
        self.index * (1.0 - 0.5 * (self.gamma2[0] * x[0] * x[0] + self.gamma2[1] * x[1] * x[1]))
    }

    /// The ray equation d/ds(n dr/ds) = ∇n with ds = n dz/T_z, T = n dr/ds; the profile does not
    /// depend on z, so T_z stays.
    fn slope(&self, [x, y, tx, ty]: [f64; 4], tz: f64) -> [f64; 4] {
        let pull = -self.profile([x, y]) * self.index / tz;
        [
            tx / tz,
            ty / tz,
            pull * self.gamma2[0] * x,
            pull * self.gamma2[1] * y,
        ]
    }

    fn traced(&self, ray: &Ray, outside: f64) -> Ray {
        let Frame { t, s, k } = self.frame;
        let entered = ray.on_plane(self.at, k);
        let r = entered.at - self.at;
        // Snell at a face square to k: the components of n·direction in the face go through.
        let across = entered.direction * outside;
        let mut state = [r.dot(&t), r.dot(&s), across.dot(&t), across.dot(&s)];
        let ahead = |index: f64, tx: f64, ty: f64| (index * index - tx * tx - ty * ty).sqrt();
        let tz = ahead(self.profile([state[0], state[1]]), state[2], state[3]);
        let step = self.length / self.steps as f64;
        let moved = |from: [f64; 4], by: f64, slope: [f64; 4]| {
            std::array::from_fn(|i| from[i] + by * slope[i])
        };
        for _ in 0..self.steps {
            let k1 = self.slope(state, tz);
            let k2 = self.slope(moved(state, step / 2.0, k1), tz);
            let k3 = self.slope(moved(state, step / 2.0, k2), tz);
            let k4 = self.slope(moved(state, step, k3), tz);
            let mean = std::array::from_fn(|i| (k1[i] + 2.0 * (k2[i] + k3[i]) + k4[i]) / 6.0);
            state = moved(state, step, mean);
        }
        let [x, y, tx, ty] = state;
        Ray {
            at: self.at + k * self.length + t * x + s * y,
            direction: (t * tx + s * ty + k * ahead(outside, tx, ty)) / outside,
        }
    }
}

enum Part {
    Mirror(Surface),
    Refraction {
        surface: Surface,
        before: f64,
        after: f64,
    },
    Lens {
        at: Vector,
        frame: Frame,
        power: [f64; 2],
        index: f64,
    },
    Duct {
        duct: Duct,
        outside: f64,
    },
}

impl Part {
    fn traced(&self, ray: &Ray) -> Ray {
        match self {
            Self::Mirror(surface) => {
                let (met, normal) = surface.met_by(ray);
                Ray {
                    direction: reflected(met.direction, normal),
                    ..met
                }
            }
            Self::Refraction {
                surface,
                before,
                after,
            } => {
                let (met, normal) = surface.met_by(ray);
                Ray {
                    direction: refracted(met.direction, normal, *before, *after),
                    ..met
                }
            }
            Self::Lens {
                at,
                frame,
                power,
                index,
            } => {
                let met = ray.on_plane(*at, frame.k);
                let r = met.at - at;
                let aside = [(frame.t, power[0]), (frame.s, power[1])]
                    .map(|(axis, power)| {
                        axis * (met.direction.dot(&axis) - power * r.dot(&axis) / index)
                    })
                    .iter()
                    .sum::<Vector>();
                Ray {
                    direction: aside + frame.k * (1.0 - aside.norm_squared()).sqrt(),
                    ..met
                }
            }
            Self::Duct { duct, outside } => duct.traced(ray, *outside),
        }
    }
}

/// A row of optics along a chief ray, each put where the ones before it have sent the beam.
///
/// A standing cavity is laid out and back: behind an end mirror met squarely (`aoi` 0, `fold`
/// [`LEFT`]) the pilot meets the same parts again with left and right exchanged, so a mirror's fold
/// σ becomes π − σ, and the lean of a surface or slab, whose forward normal is reversed too, −σ.
pub struct Bench {
    parts: Vec<Part>,
    at: Vector,
    frame: Frame,
    start_index: f64,
    index: f64,
    length: f64,
    tightest: f64,
}

impl Bench {
    /// An empty bench in a medium of the given index.
    pub fn new(index: f64) -> Self {
        Self {
            parts: Vec::new(),
            at: Vector::zeros(),
            frame: Frame::start(),
            start_index: index,
            index,
            length: 0.0,
            tightest: f64::INFINITY,
        }
    }

    /// A length of homogeneous medium; where the index changes, a flat face square to the beam
    /// stands at its beginning.
    pub fn gap(&mut self, length: f64, index: f64) -> &mut Self {
        if index != self.index {
            self.surface(index, f64::INFINITY, 0.0, LEFT);
        }
        self.advance(length);
        self
    }

    /// A mirror that turns the beam to the side `fold`; radii concave positive, one along the
    /// in-surface axis in the plane of incidence and one across it. Equal radii make an exact
    /// sphere.
    pub fn mirror(&mut self, roc_in_plane: f64, roc_across: f64, aoi: f64, fold: f64) -> &mut Self {
        let (inward, k) = (self.frame.toward(fold), self.frame.k);
        let normal = inward * aoi.sin() - k * aoi.cos();
        let surface = if roc_in_plane == roc_across {
            Surface::sphere(self.at, normal, roc_in_plane)
        } else {
            let along = inward * aoi.cos() + k * aoi.sin();
            let across = normal.cross(&along);
            Surface {
                curvature: along * along.transpose() / roc_in_plane
                    + across * across.transpose() / roc_across,
                ..Surface::plane(self.at, normal)
            }
        };
        self.note_lengths([roc_in_plane, roc_across]);
        self.parts.push(Part::Mirror(surface));
        self.frame = self.frame.turned(fold, PI - 2.0 * aoi);
        self
    }

    /// A refracting surface into a medium of index `after`; the radius is positive where the centre
    /// lies on the far side. The forward normal leans to the side `lean`, which is the side to
    /// which a denser medium bends the beam.
    pub fn surface(&mut self, after: f64, radius: f64, aoi: f64, lean: f64) -> &mut Self {
        let normal = self.frame.k * aoi.cos() + self.frame.toward(lean) * aoi.sin();
        self.note_lengths([radius; 2]);
        self.parts.push(Part::Refraction {
            surface: Surface::sphere(self.at, normal, radius),
            before: self.index,
            after,
        });
        self.frame = self
            .frame
            .turned(lean, aoi - angle_behind(aoi, self.index, after));
        self.index = after;
        self
    }

    /// A slab of a thickness square to its parallel vertex planes, whose faces have their vertices
    /// on the chief ray; face radii are positive where convex as seen from outside the slab. A
    /// slab denser than its surroundings displaces the beam to the side `shift`.
    pub fn slab(
        &mut self,
        index: f64,
        thickness: f64,
        [entrance, exit]: [f64; 2],
        aoi: f64,
        shift: f64,
    ) -> &mut Self {
        let outside = self.index;
        let inside = angle_behind(aoi, outside, index);
        self.surface(index, entrance, aoi, shift)
            .gap(thickness / inside.cos(), index)
            .surface(outside, -exit, inside, shift)
    }

    /// A thin ideal lens square to the beam: p −= x/f in each plane, whatever the medium.
    pub fn lens(&mut self, focal_t: f64, focal_s: f64) -> &mut Self {
        self.note_lengths([focal_t, focal_s]);
        self.parts.push(Part::Lens {
            at: self.at,
            frame: self.frame,
            power: [1.0 / focal_t, 1.0 / focal_s],
            index: self.index,
        });
        self
    }

    /// A duct with the index `index` (1 − γ_t² x_t²/2 − γ_s² x_s²/2), its faces square to the
    /// beam, traced in `steps` Runge–Kutta steps of fourth order; the medium behind it is that
    /// before it. γ² < 0 is antiguiding. Error about |γ²L²|^2.5 / (120 steps⁴).
    pub fn duct(&mut self, index: f64, gamma2: [f64; 2], length: f64, steps: usize) -> &mut Self {
        self.note_lengths(gamma2.map(|g| g.abs().sqrt().recip()));
        self.parts.push(Part::Duct {
            duct: Duct {
                at: self.at,
                frame: self.frame,
                index,
                gamma2,
                length,
                steps,
            },
            outside: self.index,
        });
        self.advance(length);
        self
    }

    /// Where the chief ray is now.
    pub fn at(&self) -> Vector {
        self.at
    }

    /// The carried frame of the chief ray now.
    pub fn frame(&self) -> Frame {
        self.frame
    }

    /// How far, and by what angle, a ring misses its beginning.
    pub fn closure(&self) -> (f64, f64) {
        let first = Frame::start().k;
        let last = self.frame.k;
        (
            self.at.norm(),
            first.cross(&last).norm().atan2(first.dot(&last)),
        )
    }

    /// The angle about k, in (−π, π], by which the frame comes back rolled from a ring; the last
    /// direction is first taken onto the first by the shortest rotation. Positive from t to s.
    pub fn roll(&self) -> f64 {
        let start = Frame::start();
        let back = self.frame.aligned(start.k);
        back.t.dot(&start.s).atan2(back.t.dot(&start.t))
    }

    /// The matrix from the start of the bench to here, each end in its carried frame.
    pub fn matrix(&self) -> Matrix4<f64> {
        self.differences(&self.frame)
    }

    /// The round-trip matrix of a ring: both ends in the frame of the start, whose k the shortest
    /// rotation has taken onto the last direction. A roll of the carried frame is in it.
    pub fn round_trip(&self) -> Matrix4<f64> {
        self.differences(&Frame::start().aligned(self.frame.k))
    }

    fn advance(&mut self, length: f64) {
        self.at += self.frame.k * length;
        self.length += length;
    }

    fn note_lengths(&mut self, lengths: [f64; 2]) {
        for length in lengths {
            self.tightest = self.tightest.min(length.abs());
        }
    }

    /// Coordinates in `end` of the traced ray that starts with the given ones.
    fn traced(&self, start: &Vector4<f64>, end: &Frame) -> Vector4<f64> {
        let Frame { t, s, k } = Frame::start();
        let aside = (t * start[2] + s * start[3]) / self.start_index;
        let first = Ray {
            at: t * start[0] + s * start[1],
            direction: aside + k * (1.0 - aside.norm_squared()).sqrt(),
        };
        let last = self
            .parts
            .iter()
            .fold(first, |ray, part| part.traced(&ray))
            .on_plane(self.at, end.k);
        let r = last.at - self.at;
        let p = last.direction * self.index;
        Vector4::new(r.dot(&end.t), r.dot(&end.s), p.dot(&end.t), p.dot(&end.s))
    }

    /// The derivative of the end coordinates by the start coordinates: central differences of
    /// sixth order.
    fn differences(&self, end: &Frame) -> Matrix4<f64> {
        let scale = if self.tightest.is_finite() {
            self.tightest
        } else {
            self.length.max(1.0)
        };
        let chief = self.traced(&Vector4::zeros(), end);
        let off = Vector4::new(chief[0] / scale, chief[1] / scale, chief[2], chief[3]);
        assert!(
            off.amax() < 1e-11 * (1.0 + self.length / scale),
            "the traced chief ray leaves the bench's own axis by {off}"
        );
        let step_x = STEP * scale;
        let step_p = STEP * scale / scale.max(self.length);
        let steps = [step_x, step_x, step_p, step_p];
        Matrix4::from_columns(&[0, 1, 2, 3].map(|axis| {
            let pair = |multiple: f64| {
                let mut start = Vector4::zeros();
                start[axis] = multiple * steps[axis];
                self.traced(&start, end) - self.traced(&-start, end)
            };
            (pair(1.0) * 45.0 - pair(2.0) * 9.0 + pair(3.0)) / (60.0 * steps[axis])
        }))
    }
}

/// The largest difference of two matrices with lengths counted in `unit`, relative to the largest
/// element (or to 1, where that is larger).
pub fn deviation(found: &Matrix4<f64>, wanted: &Matrix4<f64>, unit: f64) -> f64 {
    let scaled = |m: &Matrix4<f64>| {
        Matrix4::from_fn(|i, j| {
            m[(i, j)]
                * match (i < 2, j < 2) {
                    (true, false) => 1.0 / unit,
                    (false, true) => unit,
                    _ => 1.0,
                }
        })
    };
    let wanted = scaled(wanted);
    (scaled(found) - wanted).amax() / wanted.amax().max(1.0)
}

/// How far a matrix is from being symplectic, MᵀJM = J, with lengths counted in `unit`.
pub fn symplectic_defect(m: &Matrix4<f64>, unit: f64) -> f64 {
    let units = Matrix4::from_diagonal(&Vector4::new(unit, unit, 1.0, 1.0));
    let m = units.try_inverse().expect("a length is not zero") * m * units;
    let j = Matrix4::from_fn(|i, j| match (i, j) {
        (0, 2) | (1, 3) => 1.0,
        (2, 0) | (3, 1) => -1.0,
        _ => 0.0,
    });
    (m.transpose() * j * m - j).amax() / m.norm_squared().max(1.0)
}

/// The tracer against closed forms, so that it may judge others. Tilted surfaces: Massey & Siegman,
/// Appl. Opt. 8, 975 (1969); plates at Brewster's angle and folding mirrors: Kogelnik, Ippen,
/// Dienes & Shank, IEEE J. Quantum Electron. 8, 373 (1972); ducts: Kogelnik & Li, Appl. Opt. 5,
/// 1550 (1966).
mod tests {
    use super::*;

    const FLAT: f64 = f64::INFINITY;
    /// Lengths of the order of these benches.
    const UNIT: f64 = 0.1;

    /// Two planes that do not mix, each [[A, B], [C, D]].
    fn planes(t: [[f64; 2]; 2], s: [[f64; 2]; 2]) -> Matrix4<f64> {
        Matrix4::from_fn(|i, j| match (i % 2, j % 2) {
            (0, 0) => t[i / 2][j / 2],
            (1, 1) => s[i / 2][j / 2],
            _ => 0.0,
        })
    }

    fn gap(reduced: f64) -> Matrix4<f64> {
        planes([[1.0, reduced], [0.0, 1.0]], [[1.0, reduced], [0.0, 1.0]])
    }

    /// Coordinates along (side, a quarter turn on) from coordinates along (t, s).
    fn turned(side: f64) -> Matrix4<f64> {
        let (sin, cos) = side.sin_cos();
        planes([[cos, 0.0], [0.0, cos]], [[cos, 0.0], [0.0, cos]])
            + Matrix4::from_fn(|i, j| match (i, j) {
                (0, 1) | (2, 3) => sin,
                (1, 0) | (3, 2) => -sin,
                _ => 0.0,
            })
    }

    fn at_side(m: Matrix4<f64>, side: f64) -> Matrix4<f64> {
        turned(-side) * m * turned(side)
    }

    fn mirror(n: f64, in_plane: f64, across: f64, aoi: f64) -> Matrix4<f64> {
        let c = -2.0 * n / (in_plane * aoi.cos());
        planes(
            [[-1.0, 0.0], [-c, -1.0]],
            [[1.0, 0.0], [-2.0 * n * aoi.cos() / across, 1.0]],
        )
    }

    fn surface(n1: f64, n2: f64, radius: f64, aoi: f64) -> Matrix4<f64> {
        let (cos1, cos2) = (aoi.cos(), angle_behind(aoi, n1, n2).cos());
        let power = (n2 * cos2 - n1 * cos1) / radius;
        planes(
            [[cos2 / cos1, 0.0], [-power / (cos1 * cos2), cos1 / cos2]],
            [[1.0, 0.0], [-power, 1.0]],
        )
    }

    fn duct(n0: f64, gamma2: [f64; 2], length: f64) -> Matrix4<f64> {
        let [t, s] = gamma2.map(|g2| {
            let g = g2.abs().sqrt();
            let (cos, sin) = if g2 > 0.0 {
                ((g * length).cos(), (g * length).sin())
            } else {
                ((g * length).cosh(), (g * length).sinh())
            };
            [[cos, sin / (n0 * g)], [-n0 * g2 * sin / g, cos]]
        });
        planes(t, s)
    }

    #[track_caller]
    fn agrees(bench: &Bench, wanted: Matrix4<f64>) {
        matrix_agrees(&bench.matrix(), wanted);
    }

    #[track_caller]
    fn matrix_agrees(found: &Matrix4<f64>, wanted: Matrix4<f64>) {
        let deviation = deviation(found, &wanted, UNIT);
        assert!(
            deviation < ACCURACY,
            "off by {deviation:e}\nfound{found}wanted{wanted}"
        );
        let defect = symplectic_defect(found, UNIT);
        assert!(defect < ACCURACY, "not symplectic by {defect:e}");
    }

    #[test]
    fn gaps_and_faces_square_to_the_beam() {
        agrees(Bench::new(1.0).gap(0.3, 1.0), gap(0.3));
        agrees(
            Bench::new(1.0).gap(0.3, 1.0).gap(0.2, 1.7).gap(0.1, 1.0),
            gap(0.4 + 0.2 / 1.7),
        );
    }

    #[test]
    fn tilted_mirrors_focus_and_flip() {
        for (n, roc, aoi) in [
            (1.0, 0.05, 0.14),
            (1.0, -0.2, 0.6),
            (1.5, 0.1, 0.5),
            (1.5, FLAT, 0.7),
            (1.0, 1e4, 0.2),
            (1.0, 0.1, 0.0),
        ] {
            for side in [LEFT, UP, RIGHT, DOWN, 0.5, 4.0] {
                agrees(
                    Bench::new(n).mirror(roc, roc, aoi, side),
                    at_side(mirror(n, roc, roc, aoi), side),
                );
                agrees(
                    Bench::new(n)
                        .gap(0.1, n)
                        .mirror(roc, 0.3, aoi, side)
                        .gap(0.05, n),
                    gap(0.05 / n) * at_side(mirror(n, roc, 0.3, aoi), side) * gap(0.1 / n),
                );
            }
        }
    }

    #[test]
    fn a_fold_up_exchanges_the_planes() {
        let exchanged = |m: Matrix4<f64>| Matrix4::from_fn(|i, j| m[(i ^ 1, j ^ 1)]);
        let folded = |side| Bench::new(1.0).mirror(0.1, 0.2, 0.4, side).matrix();
        matrix_agrees(&folded(UP), exchanged(folded(LEFT)));
        matrix_agrees(&folded(DOWN), exchanged(folded(RIGHT)));
        // After a fold up the pilot looks along the old up, the old ahead lies beneath.
        let mut bench = Bench::new(1.0);
        let Frame { t, s, k } = bench.mirror(FLAT, FLAT, PI / 4.0, UP).frame();
        for (found, wanted) in [(t, Vector::y()), (s, -Vector::x()), (k, Vector::z())] {
            assert!((found - wanted).norm() < 1e-14);
        }
    }

    /// The first-order matrix does not see this: far off the axis, met from either side and from
    /// behind, rays still end on the sphere with its normal through the centre.
    #[test]
    fn surfaces_are_spheres_far_off_the_axis() {
        for radius in [0.1, -0.1] {
            let surface = Surface::sphere(Vector::zeros(), -Vector::x(), radius);
            let centre = -Vector::x() * radius;
            for (start, y) in [(-0.3, 0.01), (-0.001, -0.06), (0.3, 0.03)] {
                let ray = Ray {
                    at: Vector::new(start, y, 0.01),
                    direction: Vector::new(1.0, 0.1, -0.2).normalize(),
                };
                let (met, normal) = surface.met_by(&ray);
                assert!(((met.at - centre).norm() - 0.1).abs() < 1e-14);
                assert!(
                    met.at.norm() < 0.1_f64.hypot(0.1),
                    "the far side of the sphere"
                );
                assert!(normal.cross(&(met.at - centre)).norm() < 1e-14);
                assert!((met.at - ray.at).cross(&ray.direction).norm() < 1e-14);
            }
        }
    }

    /// Long arms and short radii, twice around: the rays wander far between their foci.
    #[test]
    fn a_long_path_through_short_radii() {
        let (roc, aoi) = (0.1, 0.1);
        let mut bench = Bench::new(1.0);
        let mut wanted = Matrix4::identity();
        for _ in 0..2 {
            for (length, roc, fold) in [(1.5, roc, LEFT), (0.103, roc, RIGHT), (0.8, FLAT, LEFT)] {
                bench.gap(length, 1.0).mirror(roc, roc, aoi, fold);
                wanted = mirror(1.0, roc, roc, aoi) * gap(length) * wanted;
            }
        }
        agrees(&bench, wanted);
    }

    #[test]
    fn tilted_refracting_surfaces() {
        for (n1, n2, radius, aoi) in [
            (1.0, 1.5, 0.05, 0.0),
            (1.0, 1.76, 0.05, 0.9),
            (1.0, 1.76, -0.08, 0.9),
            (1.76, 1.0, 0.1, 0.4),
            (1.3, 2.2, FLAT, 1.0),
        ] {
            for side in [LEFT, UP, RIGHT, DOWN, 2.5] {
                agrees(
                    Bench::new(n1).surface(n2, radius, aoi, side),
                    at_side(surface(n1, n2, radius, aoi), side),
                );
            }
        }
    }

    #[test]
    fn plates_at_brewsters_angle() {
        let (n, thickness) = (1.76_f64, 0.012);
        let path = thickness * (n * n + 1.0).sqrt();
        let (t, s) = (path / n.powi(4), path / n.powi(2));
        let flat = planes([[1.0, t], [0.0, 1.0]], [[1.0, s], [0.0, 1.0]]);
        for side in [LEFT, UP, RIGHT, DOWN] {
            let mut bench = Bench::new(1.0);
            bench.slab(n, thickness, [FLAT; 2], n.atan(), side);
            agrees(&bench, at_side(flat, side));
            assert!((bench.frame().k - Frame::start().k).norm() < 1e-14);
            // The plate displaces the beam to the side it is named for.
            let shift = bench.at().dot(&Frame::start().toward(side));
            let inside = n.atan() - n.recip().atan();
            assert!((shift - thickness / n.recip().atan().cos() * inside.sin()).abs() < 1e-14);
        }
    }

    #[test]
    fn slabs_with_curved_faces() {
        let (n, thickness, aoi) = (1.5, 0.02, 0.3);
        let inside = angle_behind(aoi, 1.0, n);
        agrees(
            Bench::new(1.0).slab(n, thickness, [0.2, -0.15], aoi, RIGHT),
            surface(n, 1.0, 0.15, inside)
                * gap(thickness / inside.cos() / n)
                * surface(1.0, n, 0.2, aoi),
        );
        // Convex on both sides converges.
        let mut lens = Bench::new(1.0);
        assert!(lens.slab(n, 1e-3, [0.2, 0.2], 0.0, LEFT).matrix()[(2, 0)] < 0.0);
    }

    #[test]
    fn lenses_act_alike_in_every_medium() {
        for n in [1.0, 1.5] {
            agrees(
                Bench::new(n).gap(0.1, n).lens(0.2, -0.3).gap(0.05, n),
                gap(0.05 / n)
                    * planes(
                        [[1.0, 0.0], [-1.0 / 0.2, 1.0]],
                        [[1.0, 0.0], [1.0 / 0.3, 1.0]],
                    )
                    * gap(0.1 / n),
            );
        }
    }

    #[test]
    fn ducts_bend_as_cosine_and_hyperbolic_cosine() {
        for gamma2 in [[100.0, 900.0], [400.0, -400.0], [-50.0, 1e-6]] {
            agrees(
                Bench::new(1.0).gap(0.01, 1.0).duct(1.8, gamma2, 0.05, 400),
                duct(1.8, gamma2, 0.05) * gap(0.01),
            );
        }
    }

    /// A thermal lens spread along the path in a tilted crystal.
    #[test]
    fn a_duct_between_tilted_faces() {
        let (n, path, power, aoi) = (1.8, 0.02, 4.0, 1.0);
        let inside = angle_behind(aoi, 1.0, n);
        let gamma2 = [power / (n * path), 0.5 * power / (n * path)];
        agrees(
            Bench::new(1.0)
                .surface(n, FLAT, aoi, LEFT)
                .duct(n, gamma2, path, 200)
                .surface(1.0, FLAT, inside, LEFT),
            surface(n, 1.0, FLAT, inside) * duct(n, gamma2, path) * surface(1.0, n, FLAT, aoi),
        );
    }

    /// A planar ring of three mirrors: one flip of t, none of s, no roll.
    #[test]
    fn a_planar_triangle_flips_t_once() {
        let side = 0.1;
        let aoi = PI / 6.0;
        let mut bench = Bench::new(1.0);
        for roc in [FLAT, 0.2, FLAT] {
            bench.gap(side, 1.0).mirror(roc, roc, aoi, LEFT);
        }
        let (distance, angle) = bench.closure();
        assert!(distance < 1e-14 && angle < 1e-14, "{distance:e} {angle:e}");
        assert!(bench.roll().abs() < 1e-14);
        let wanted = mirror(1.0, FLAT, FLAT, aoi)
            * gap(side)
            * mirror(1.0, 0.2, 0.2, aoi)
            * gap(side)
            * mirror(1.0, FLAT, FLAT, aoi)
            * gap(side);
        agrees(&bench, wanted);
        matrix_agrees(&bench.round_trip(), wanted);
        // Without any curvature only the flip is left.
        let mut flat = Bench::new(1.0);
        for _ in 0..3 {
            flat.gap(side, 1.0).mirror(FLAT, FLAT, aoi, LEFT);
        }
        let flips = planes([[-1.0, 0.0], [0.0, -1.0]], [[1.0, 0.0], [0.0, 1.0]]);
        matrix_agrees(&flat.round_trip(), flips * gap(3.0 * side));
    }

    /// Two flat and two curved mirrors in a crossed figure, a tilted crystal between the curved.
    #[test]
    fn a_bow_tie_with_a_tilted_crystal() {
        let (aoi, n, thickness, tilt) = (0.14, 1.605, 0.015, 1.0);
        let inside = angle_behind(tilt, 1.0, n);
        let rocs = [FLAT, FLAT, 0.05, 0.05];
        let mut bench = Bench::new(1.0);
        bench
            .gap(0.08, 1.0)
            .mirror(rocs[1], rocs[1], aoi, LEFT)
            .gap(0.07334, 1.0)
            .mirror(rocs[2], rocs[2], aoi, RIGHT)
            .gap(0.023, 1.0)
            .slab(n, thickness, [FLAT; 2], tilt, LEFT)
            .gap(0.023, 1.0)
            .mirror(rocs[3], rocs[3], aoi, RIGHT)
            .gap(0.07334, 1.0)
            .mirror(rocs[0], rocs[0], aoi, LEFT);
        let [m1, m2, m3, m4] = rocs.map(|roc| mirror(1.0, roc, roc, aoi));
        let crystal = surface(n, 1.0, FLAT, inside)
            * gap(thickness / inside.cos() / n)
            * surface(1.0, n, FLAT, tilt);
        let back = m1 * gap(0.07334) * m4 * gap(0.023);
        let wanted = back * crystal * gap(0.023) * m3 * gap(0.07334) * m2 * gap(0.08);
        agrees(&bench, wanted);
        // The figure does not close in place, but it does in direction: nothing rolls.
        assert!(bench.closure().1 < 1e-14 && bench.roll().abs() < 1e-14);
        matrix_agrees(&bench.round_trip(), wanted);
    }

    /// Folds to the left and upwards, a crystal tilted upwards and one face of a thick lens, out to
    /// an end mirror and back along the same path.
    #[test]
    fn a_standing_cavity_retraces_its_path() {
        let (n, tilt) = (1.5, 0.4);
        let inside = angle_behind(tilt, 1.0, n);
        let mut bench = Bench::new(1.0);
        bench
            .gap(0.05, 1.0)
            .mirror(0.2, 0.2, 0.3, LEFT)
            .gap(0.04, 1.0)
            .slab(n, 0.01, [FLAT, 0.3], tilt, UP)
            .mirror(FLAT, FLAT, 0.5, UP)
            .gap(0.03, 1.0)
            .surface(n, 0.1, tilt, 2.0)
            .gap(0.02, n);
        let outward = bench.matrix();
        bench
            .mirror(0.5, 0.5, 0.0, LEFT)
            .gap(0.02, n)
            .surface(1.0, -0.1, inside, -2.0)
            .gap(0.03, 1.0)
            .mirror(FLAT, FLAT, 0.5, PI - UP)
            .slab(n, 0.01, [0.3, FLAT], tilt, -UP)
            .gap(0.04, 1.0)
            .mirror(0.2, 0.2, 0.3, PI - LEFT)
            .gap(0.05, 1.0);
        let Frame { t, s, k } = bench.frame();
        assert!(bench.at().norm() < 1e-14);
        for (found, wanted) in [(t, -Vector::y()), (s, Vector::z()), (k, -Vector::x())] {
            assert!((found - wanted).norm() < 1e-14);
        }
        // Back is the outward matrix reversed in time, and in t, which points the other way.
        let still = Vector4::new(1.0, 1.0, -1.0, -1.0);
        let reversed = Matrix4::from_diagonal(&still);
        let mirrored = planes([[-1.0, 0.0], [0.0, -1.0]], [[1.0, 0.0], [0.0, 1.0]]);
        let inverse = outward
            .try_inverse()
            .expect("ray matrices have determinant 1");
        let back = mirrored * reversed * inverse * reversed * mirrored;
        agrees(&bench, back * mirror(n, 0.5, 0.5, 0.0) * outward);
    }

    /// Along three edges of a cube and back through its body. The directions x, y, z and
    /// w = −(x + y + z)/√3 are the corners of a polygon on the sphere: the octant xyz, π/2, and
    /// one of the three equal triangles around w that share the rest, (4π − π/2)/3. A frame
    /// carried around it is turned by the enclosed solid angle, 5π/3, which is −60°.
    #[test]
    fn a_ring_out_of_the_plane_rolls_by_the_solid_angle() {
        let edge = 0.1;
        let back = -Vector::new(1.0, 1.0, 1.0) / 3.0_f64.sqrt();
        let rocs = [0.5, FLAT, 0.3, 0.25];
        let legs = [
            (Vector::x(), edge),
            (Vector::y(), edge),
            (Vector::z(), edge),
            (back, edge * 3.0_f64.sqrt()),
        ];
        let mut bench = Bench::new(1.0);
        let mut wanted = Matrix4::identity();
        for (i, (direction, length)) in legs.into_iter().enumerate() {
            let Frame { t, s, k } = bench.frame();
            assert!((k - direction).norm() < 1e-14);
            let next = legs[(i + 1) % 4].0;
            let turn = k.dot(&next).acos();
            let (aoi, side) = ((PI - turn) / 2.0, next.dot(&s).atan2(next.dot(&t)));
            let roc = rocs[i];
            bench.gap(length, 1.0).mirror(roc, roc, aoi, side);
            wanted = at_side(mirror(1.0, roc, roc, aoi), side) * gap(length) * wanted;
        }
        let (distance, angle) = bench.closure();
        assert!(distance < 1e-14 && angle < 1e-14, "{distance:e} {angle:e}");
        let roll = bench.roll();
        assert!((roll + PI / 3.0).abs() < 1e-14, "{roll}");
        agrees(&bench, wanted);
        matrix_agrees(&bench.round_trip(), turned(-roll) * wanted);
    }
}
