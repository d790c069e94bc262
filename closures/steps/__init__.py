"""The steps of an evaluation, in order: fluid, flow, closure, turbulence, scales, wall."""
