/** How each material looks: linear base colour, metallic and roughness factors. Values from memory, by eye. */
export const MATERIALS = {
  ash: { baseColor: [0.64, 0.43, 0.23, 1], metallic: 0, roughness: 0.6 },
  beeswax: { baseColor: [0.85, 0.68, 0.36, 1], metallic: 0, roughness: 0.5 },
  brass: { baseColor: [0.79, 0.56, 0.2, 1], metallic: 1, roughness: 0.32 },
  deal: { baseColor: [0.34, 0.2, 0.09, 1], metallic: 0, roughness: 0.8 },
  enamel: { baseColor: [0.02, 0.13, 0.3, 1], metallic: 0, roughness: 0.18 },
  glass: { baseColor: [1, 0.78, 0.42, 0.45], metallic: 0, roughness: 0.06, alphaMode: "BLEND" },
  hemp: { baseColor: [0.5, 0.38, 0.2, 1], metallic: 0, roughness: 0.95 },
  leather: { baseColor: [0.13, 0.055, 0.025, 1], metallic: 0, roughness: 0.7 },
  painted_ash: { baseColor: [0.5, 0.035, 0.025, 1], metallic: 0, roughness: 0.4 },
  rubber: { baseColor: [0.035, 0.04, 0.045, 1], metallic: 0, roughness: 0.9 },
  steel: { baseColor: [0.48, 0.5, 0.53, 1], metallic: 1, roughness: 0.36 },
  tin: { baseColor: [0.42, 0.45, 0.46, 1], metallic: 1, roughness: 0.45 },
  twine: { baseColor: [0.36, 0.03, 0.03, 1], metallic: 0, roughness: 0.9 },
};
