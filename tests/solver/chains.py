"""Members as arrays for the tests of the axial solver: one given by hand, and random ones from a seed."""

from __future__ import annotations

import numpy as np

from solver.chain import Chain, Loads


def chain_of(
    length, rigidity_or_area, *, modulus=1.0, bedding=(), fixed=(), spring=(), expansion=0.0, density=0.0
):
    """n segments; areas (n,) or Bernstein (n, 3); `fixed` lists joints, `spring` pairs of joint and N/m."""
    length, area = np.array(length, float), np.array(rigidity_or_area, float)
    count = length.size
    held, springs = np.zeros(count + 1, bool), np.zeros(count + 1)
    held[list(fixed)] = True
    for joint, stiffness in spring:
        springs[joint] = stiffness
    return Chain(
        length=length,
        modulus=np.full(count, modulus) if np.isscalar(modulus) else np.array(modulus, float),
        area=np.repeat(area[:, None], 3, axis=1) if area.ndim == 1 else area,
        bedding=np.array(bedding, float).reshape(-1, 2) if len(bedding) else np.zeros((count, 2)),
        expansion=np.full(count, expansion),
        density=np.full(count, density),
        fixed=held,
        spring=springs,
    )


def loads_of(
    chain, states=1, *, distributed=0.0, gravity=0.0, temperature=0.0, misfit=0.0, force=(), movement=()
):
    """`distributed` and `temperature` broadcast to (m, n, 2), the rest alike; pairs of joint, value."""
    count = chain.length.size
    forces, movements = np.zeros((states, count + 1)), np.zeros((states, count + 1))
    for joint, value in force:
        forces[:, joint] = value
    for joint, value in movement:
        movements[:, joint] = value
    return Loads(
        distributed=np.broadcast_to(np.asarray(distributed, float), (states, count, 2)),
        gravity=np.broadcast_to(np.asarray(gravity, float), (states,)),
        temperature=np.broadcast_to(np.asarray(temperature, float), (states, count, 2)),
        lack_of_fit=np.broadcast_to(np.asarray(misfit, float), (states, count)),
        joint_force=forces,
        movement=movements,
    )


def random_loads(rng, chain, states=1):
    """Every kind of load, each entry there in half of the cases, so that unloaded parts are among them."""
    count = chain.length.size

    def some(scale, *shape):
        there = rng.random((*shape[:2], *[1] * (len(shape) - 2))) < 0.5
        return scale * rng.normal(size=shape) * there

    return Loads(
        distributed=some(1e3, states, count, 2),
        gravity=some(10, states),
        temperature=some(30, states, count, 2),
        lack_of_fit=some(1e-3, states, count),
        joint_force=some(1e4, states, count + 1),
        movement=some(1e-3, states, count + 1) * (chain.fixed | (chain.spring > 0)),
    )


def random_supports(rng, count, contrast):
    """(n + 1,) fixed and spring, at least one of them; springs between 1e5 N/m and `contrast` times it."""
    kind = rng.integers(0, 3, count) * (rng.random(count) < 0.5)
    fixed = kind == 1
    spring = np.where(kind == 2, 1e5 * contrast ** rng.uniform(0, 1, count), 0.0)
    if not fixed.any() and not spring.any():
        fixed[rng.integers(0, count)] = True
    return fixed, spring


def random_prismatic(rng, *, bedded=False):
    """One to six prismatic segments; stiffnesses up to 1e9 apart, bedding with μL from 0.1 to 30."""
    count, contrast = int(rng.integers(1, 7)), 10 ** rng.uniform(0, 9)
    modulus, area = 1e9 * contrast ** rng.uniform(0, 1, count), 10 ** rng.uniform(-4, -2, count)
    length = rng.uniform(0.1, 5, count)
    mu = 10 ** rng.uniform(-1, np.log10(30), count) * (rng.random(count) < 0.7) / length * bedded
    fixed, spring = random_supports(rng, count + 1, contrast)
    return Chain(
        length=length,
        modulus=modulus,
        area=np.repeat(area[:, None], 3, axis=1),
        bedding=np.repeat((mu**2 * modulus * area)[:, None], 2, axis=1),
        expansion=rng.uniform(0, 2e-5, count),
        density=rng.uniform(0, 8000, count),
        fixed=fixed,
        spring=spring,
    )


def random_tapered(rng, *, bedded=False):
    """One to four round tapers, diameters up to 1 : 20 apart; bedding varies along the segment."""
    count = int(rng.integers(1, 5))
    modulus, length = 10 ** rng.uniform(10, 11.5, count), rng.uniform(0.1, 5, count)
    start = rng.uniform(0.02, 0.2, count)
    end = start * 20 ** (rng.uniform(-1, 1, count) * (rng.random(count) < 0.7))
    area = np.pi / 4 * np.stack([start * start, start * end, end * end], axis=1)
    mu = (
        10 ** rng.uniform(-1, np.log10(30), (count, 2)) * (rng.random(count) < 0.6)[:, None] / length[:, None]
    )
    fixed, spring = random_supports(rng, count + 1, 1e4)
    return Chain(
        length=length,
        modulus=modulus,
        area=area,
        bedding=bedded * mu**2 * (modulus * area.min(axis=1))[:, None],
        expansion=rng.uniform(0, 2e-5, count),
        density=rng.uniform(0, 8000, count),
        fixed=fixed,
        spring=spring,
    )
