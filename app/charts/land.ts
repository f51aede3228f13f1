import type { Feature, FeatureCollection } from 'geojson';
import { feature } from 'topojson-client';
import type { GeometryCollection, Topology } from 'topojson-specification';
import atlas from 'world-atlas/land-110m.json';

/** Coastlines: Natural Earth (public domain) at 1:110 million, by the package world-atlas. */
const topology = atlas as unknown as Topology<{ land: GeometryCollection }>;

export const LAND: Feature | FeatureCollection = feature(topology, topology.objects.land);
