//! Spectral elements and the modes of a layered slab.
//!
//! Gauss–Lobatto–Legendre elements, one a layer: the mass is diagonal, so that
//! the modes are the eigenvectors of one symmetric matrix. Nothing is checked
//! here: thicknesses and properties come checked.

use super::Layer;

/// The points of an element on −1..=1, their weights, and the derivatives of
/// its base functions there.
pub struct Element {
    pub points: Vec<f64>,
    pub weights: Vec<f64>,
    /// Row by row: derivative at point i of the function of point j.
    pub slopes: Vec<f64>,
}

/// Legendre polynomials P of the degree and the one below, at x.
fn legendre(degree: usize, x: f64) -> (f64, f64) {
    let (mut below, mut here) = (1.0, x);
    for k in 2..=degree {
        let k = k as f64;
        (below, here) = (here, ((2.0 * k - 1.0) * x * here - (k - 1.0) * below) / k);
    }
    (here, below)
}

impl Element {
    /// The element of a degree of at least 1.
    pub fn new(degree: usize) -> Element {
        let n = degree as f64;
        let mut points = Vec::with_capacity(degree + 1);
        for index in 0..=degree {
            let mut x = -(std::f64::consts::PI * index as f64 / n).cos();
            // Newton on (1 − x²)·P′ by its own recurrence: ends stay ends.
            for _ in 0..100 {
                let (here, below) = legendre(degree, x);
                let step = (x * here - below) / ((n + 1.0) * here);
                x -= step;
                if step.abs() < 1e-16 {
                    break;
                }
            }
            points.push(x);
        }
        points[0] = -1.0;
        points[degree] = 1.0;
        let heights: Vec<f64> = points.iter().map(|x| legendre(degree, *x).0).collect();
        let weights = heights
            .iter()
            .map(|height| 2.0 / (n * (n + 1.0) * height * height))
            .collect();
        let mut slopes = vec![0.0; (degree + 1) * (degree + 1)];
        for i in 0..=degree {
            for j in 0..=degree {
                slopes[i * (degree + 1) + j] = if i == j {
                    match i {
                        0 => -n * (n + 1.0) / 4.0,
                        _ if i == degree => n * (n + 1.0) / 4.0,
                        _ => 0.0,
                    }
                } else {
                    heights[i] / heights[j] / (points[i] - points[j])
                };
            }
        }
        Element {
            points,
            weights,
            slopes,
        }
    }

    /// The values of the base functions at a place on −1..=1.
    pub fn shape(&self, x: f64) -> Vec<f64> {
        let count = self.points.len();
        (0..count)
            .map(|i| {
                (0..count)
                    .filter(|j| *j != i)
                    .map(|j| (x - self.points[j]) / (self.points[i] - self.points[j]))
                    .product()
            })
            .collect()
    }
}

/// The slab as a system of modes: temperature above the base is the sum of
/// shapes times amplitudes, and each amplitude a lives by itself,
/// a′ = −rate·a + gain·flux.
pub struct Modes {
    pub elements: Vec<Element>,
    /// Depth of each node below the surface, the held base left out, m.
    pub depths: Vec<f64>,
    /// Heat capacity that each node stands for, J/(m²·K).
    pub masses: Vec<f64>,
    /// Decay rates, 1/s.
    pub rates: Vec<f64>,
    /// Amplitude that a flux of 1 W/m² gives in 1 s, per mode.
    pub gains: Vec<f64>,
    /// Value of mode k at node i: `shapes[i * count + k]`.
    pub shapes: Vec<f64>,
}

impl Modes {
    pub fn new(layers: &[Layer], degrees: &[usize]) -> Modes {
        let count: usize = degrees.iter().sum();
        let elements: Vec<Element> = degrees.iter().map(|degree| Element::new(*degree)).collect();
        let mut depths = vec![0.0; count + 1];
        let mut masses = vec![0.0; count + 1];
        let mut loss = vec![0.0; count + 1];
        let mut stiffness = vec![0.0; (count + 1) * (count + 1)];
        let (mut first, mut top) = (0, 0.0);
        for (layer, element) in layers.iter().zip(&elements) {
            let size = element.points.len();
            let half = layer.thickness / 2.0;
            for i in 0..size {
                depths[first + i] = top + half * (1.0 + element.points[i]);
                masses[first + i] += half * element.weights[i] * layer.heat_capacity;
                loss[first + i] += half * element.weights[i] * layer.perfusion;
                for j in 0..size {
                    let sum: f64 = (0..size)
                        .map(|m| {
                            element.weights[m]
                                * element.slopes[m * size + i]
                                * element.slopes[m * size + j]
                        })
                        .sum();
                    stiffness[(first + i) * (count + 1) + first + j] +=
                        layer.conductivity / half * sum;
                }
            }
            first += size - 1;
            top += layer.thickness;
        }
        let roots: Vec<f64> = masses.iter().map(|mass: &f64| mass.sqrt()).collect();
        let mut matrix = vec![0.0; count * count];
        for i in 0..count {
            for j in 0..count {
                let lost = if i == j { loss[i] } else { 0.0 };
                matrix[i * count + j] =
                    (stiffness[i * (count + 1) + j] + lost) / (roots[i] * roots[j]);
            }
        }
        let (rates, vectors) = eigen(matrix, count);
        let mut shapes = vectors;
        for (i, row) in shapes.chunks_mut(count).enumerate() {
            for value in row {
                *value /= roots[i];
            }
        }
        let gains = shapes[..count].to_vec();
        depths.truncate(count);
        masses.truncate(count);
        Modes {
            elements,
            depths,
            masses,
            rates,
            gains,
            shapes,
        }
    }

    pub fn count(&self) -> usize {
        self.rates.len()
    }

    /// The value of every mode at a depth.
    pub fn at(&self, layers: &[Layer], depth: f64) -> Vec<f64> {
        let count = self.count();
        let (mut first, mut top) = (0, 0.0);
        let last = layers.len() - 1;
        for (index, (layer, element)) in layers.iter().zip(&self.elements).enumerate() {
            if depth <= top + layer.thickness || index == last {
                let place = (2.0 * (depth - top) / layer.thickness - 1.0).clamp(-1.0, 1.0);
                let weights = element.shape(place);
                return (0..count)
                    .map(|k| {
                        weights
                            .iter()
                            .enumerate()
                            .filter(|(i, _)| first + i < count)
                            .map(|(i, weight)| weight * self.shapes[(first + i) * count + k])
                            .sum()
                    })
                    .collect();
            }
            first += element.points.len() - 1;
            top += layer.thickness;
        }
        vec![0.0; count]
    }

    /// The amplitudes of a temperature above the base, given at the nodes.
    pub fn amplitudes(&self, above: impl Fn(f64) -> f64) -> Vec<f64> {
        let count = self.count();
        (0..count)
            .map(|k| {
                (0..count)
                    .map(|i| self.shapes[i * count + k] * self.masses[i] * above(self.depths[i]))
                    .sum()
            })
            .collect()
    }
}

/// Eigenvalues of a symmetric matrix and its eigenvectors as columns, by
/// Jacobi's rotations in cyclic order.
fn eigen(mut a: Vec<f64>, n: usize) -> (Vec<f64>, Vec<f64>) {
    let mut v = vec![0.0; n * n];
    for i in 0..n {
        v[i * n + i] = 1.0;
    }
    for _ in 0..60 {
        let off: f64 = (0..n)
            .flat_map(|i| (0..i).map(move |j| (i, j)))
            .map(|(i, j)| a[i * n + j].powi(2))
            .sum();
        let all: f64 = a.iter().map(|x| x * x).sum();
        if off <= 1e-34 * all {
            break;
        }
        for p in 0..n {
            for q in p + 1..n {
                rotate(&mut a, &mut v, n, p, q);
            }
        }
    }
    ((0..n).map(|i| a[i * n + i]).collect(), v)
}

/// Turns the rows and columns p and q so that their common entry vanishes.
fn rotate(a: &mut [f64], v: &mut [f64], n: usize, p: usize, q: usize) {
    let common = a[p * n + q];
    if common == 0.0 {
        return;
    }
    let theta = (a[q * n + q] - a[p * n + p]) / (2.0 * common);
    let tangent = theta.signum() / (theta.abs() + theta.hypot(1.0));
    let cosine = 1.0 / tangent.hypot(1.0);
    let sine = tangent * cosine;
    for k in 0..n {
        let (x, y) = (a[k * n + p], a[k * n + q]);
        a[k * n + p] = cosine * x - sine * y;
        a[k * n + q] = sine * x + cosine * y;
    }
    for k in 0..n {
        let (x, y) = (a[p * n + k], a[q * n + k]);
        a[p * n + k] = cosine * x - sine * y;
        a[q * n + k] = sine * x + cosine * y;
    }
    for k in 0..n {
        let (x, y) = (v[k * n + p], v[k * n + q]);
        v[k * n + p] = cosine * x - sine * y;
        v[k * n + q] = sine * x + cosine * y;
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn points_integrate_and_differentiate_polynomials_exactly() {
        for degree in [1, 2, 5, 12, 24] {
            let element = Element::new(degree);
            let size = degree + 1;
            for power in 0..2 * degree {
                let found: f64 = element
                    .points
                    .iter()
                    .zip(&element.weights)
                    .map(|(x, w)| w * x.powi(power as i32))
                    .sum();
                let expected = if power % 2 == 0 {
                    2.0 / (power as f64 + 1.0)
                } else {
                    0.0
                };
                assert!(
                    (found - expected).abs() < 2e-14,
                    "x^{power}: {found} {expected}"
                );
            }
            for i in 0..size {
                let found: f64 = (0..size)
                    .map(|j| element.slopes[i * size + j] * element.points[j].powi(degree as i32))
                    .sum();
                let expected = degree as f64 * element.points[i].powi(degree as i32 - 1);
                assert!(
                    (found - expected).abs() < 1e-10,
                    "{found} against {expected}"
                );
            }
        }
    }

    #[test]
    fn modes_of_a_plain_slab_are_those_of_the_textbook() {
        // Insulated surface, held base: rates α·((k + ½)·π/L)².
        let layer = Layer {
            thickness: 0.01,
            conductivity: 0.5,
            heat_capacity: 4e6,
            perfusion: 0.0,
        };
        let mut rates = Modes::new(&[layer], &[20]).rates;
        rates.sort_by(f64::total_cmp);
        for (k, found) in rates.iter().take(8).enumerate() {
            let wave = (k as f64 + 0.5) * std::f64::consts::PI / 0.01;
            let expected = 0.5 / 4e6 * wave * wave;
            assert!(
                (found / expected - 1.0).abs() < 1e-8,
                "{k}: {found} against {expected}"
            );
        }
    }
}
