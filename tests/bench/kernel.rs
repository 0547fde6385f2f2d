//! How the cost grows: molecules in a column, and atoms in one system, against a general-purpose spatial index.
//!
//! `cargo bench` prints the figures; DEVELOPERS.md keeps those of a described machine.

use bondmoment::bonds::find::find_bonds;
use bondmoment::charges::partial_charges;
use bondmoment::molecule::Molecule;
use bondmoment::moments;
use bondmoment::parallel::{Threads, map_rows};
use bondmoment::selectors::{BONDS_ALTERNATING, CHARGES_PEOE_1980};
use criterion::{BenchmarkId, Criterion, Throughput, criterion_group, criterion_main};
use rstar::{RTree, primitives::GeomWithData};

/// Water molecules on a cubic lattice of 3.1 Å, each turned in its own way: about the density of the liquid.
fn water_box(atoms: usize) -> (Vec<i32>, Vec<[f64; 3]>) {
    let molecules = atoms.div_ceil(3);
    let side = libm::ceil(libm::cbrt(molecules as f64)) as usize;
    let (mut elements, mut xyz) = (Vec::new(), Vec::new());
    for i in 0..molecules {
        let (x, y, z) = (i % side, i / side % side, i / side / side);
        let origin = [3.1 * x as f64, 3.1 * y as f64, 3.1 * z as f64];
        let turn = 0.7 * i as f64;
        let (s, c) = (libm::sin(turn), libm::cos(turn));
        for (element, [a, b]) in [(8, [0.0, 0.0]), (1, [0.7572, 0.5865]), (1, [-0.7572, 0.5865])] {
            elements.push(element);
            xyz.push([origin[0] + a * c - b * s, origin[1] + a * s + b * c, origin[2]]);
        }
    }
    (elements, xyz)
}

/// Chloroethane, anti: eight atoms with four polar bonds.
const ELEMENTS: [i32; 8] = [6, 6, 17, 1, 1, 1, 1, 1];
const XYZ: [[f64; 3]; 8] = [
    [0.000, 0.000, 0.000],
    [1.520, 0.000, 0.000],
    [-0.640, 1.675, 0.000],
    [-0.366, -0.510, 0.888],
    [-0.366, -0.510, -0.888],
    [1.885, 1.027, 0.000],
    [1.885, -0.513, 0.889],
    [1.885, -0.513, -0.889],
];

fn one_molecule() -> f64 {
    let molecule = Molecule { atomic_number: &ELEMENTS, formal_charge: None, xyz: &XYZ };
    let dipole = find_bonds(molecule, BONDS_ALTERNATING)
        .and_then(|bonding| partial_charges(CHARGES_PEOE_1980, molecule, &bonding, None))
        .and_then(|charges| moments::dipole(molecule, &charges, 0.0));
    dipole.map_or(f64::NAN, |dipole| dipole.magnitude.value)
}

fn molecules(c: &mut Criterion) {
    let mut group = c.benchmark_group("molecules: bonds, charges, dipole");
    group.sample_size(10);
    for n in [1_000, 10_000, 100_000] {
        group.throughput(Throughput::Elements(n as u64));
        for threads in [1, 2] {
            group.bench_with_input(BenchmarkId::new(format!("{threads} threads"), n), &n, |b, &n| {
                b.iter(|| map_rows(n, 16 * n, Threads::new(threads), |_| one_molecule()))
            });
        }
    }
    group.finish();
}

fn atoms(c: &mut Criterion) {
    let mut group = c.benchmark_group("atoms of one system: find_bonds");
    group.sample_size(10);
    for n in [1_000, 10_000, 100_000, 1_000_000] {
        let (elements, xyz) = water_box(n);
        group.throughput(Throughput::Elements(n as u64));
        group.bench_with_input(BenchmarkId::new("find_bonds with orders", n), &n, |b, _| {
            b.iter(|| {
                let molecule = Molecule { atomic_number: &elements, formal_charge: None, xyz: &xyz };
                find_bonds(molecule, BONDS_ALTERNATING).map(|bonding| bonding.bonds.len())
            })
        });
        // The general-purpose way to the candidates alone: an R*-tree of the points, one query an atom.
        group.bench_with_input(BenchmarkId::new("R*-tree, pairs within 2 Å only", n), &n, |b, _| {
            b.iter(|| {
                let points = xyz.iter().enumerate().map(|(i, &point)| GeomWithData::new(point, i)).collect();
                let tree: RTree<GeomWithData<[f64; 3], usize>> = RTree::bulk_load(points);
                xyz.iter()
                    .enumerate()
                    .map(|(i, &point)| tree.locate_within_distance(point, 4.0).filter(|near| near.data > i).count())
                    .sum::<usize>()
            })
        });
    }
    group.finish();
}

criterion_group!(benches, molecules, atoms);
criterion_main!(benches);
