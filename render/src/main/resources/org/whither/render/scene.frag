#version 330 core
// Colour of a point: exact where it is not lit; else light from one distant lamp with shadows and from the sky.
in vec3 place;
in vec3 facing;
in vec3 lightPlace;
in float number;
uniform vec3 eye;
uniform vec3 lamp;       // towards the lamp, unit length
uniform vec3 colour;     // sRGB
uniform float opacity;
uniform float gloss;
uniform bool lit;
uniform bool scaled;
uniform float entries;
uniform sampler2D scale;
uniform sampler2DShadow shadow;
out vec4 pixel;

vec3 toLinear(vec3 c) { return pow(c, vec3(2.2)); }
vec3 toScreen(vec3 c) { return pow(c, vec3(1.0 / 2.2)); }

float sunlit(float slant) {
    float bias = 0.0012 + 0.004 * (1.0 - slant);
    float texel = 1.0 / float(textureSize(shadow, 0).x);
    float sum = 0.0;
    // Four places, each the mean of four texels.
    for (int n = 0; n < 4; n++) {
        vec2 off = vec2(n < 2 ? -0.4 : 1.2, n % 2 == 0 ? -1.2 : 0.4) + (n == 1 || n == 2 ? 0.0 : 0.2);
        sum += texture(shadow, vec3(lightPlace.xy + off * texel, lightPlace.z - bias));
    }
    return 0.25 * sum;
}

void main() {
    vec3 base = colour;
    float open = number;
    if (scaled) {
        float at = clamp(number, 0.0, 1.0);
        base = texture(scale, vec2((at * (entries - 1.0) + 0.5) / entries, 0.5)).rgb;
        open = 1.0;
    }
    if (!lit) {
        pixel = vec4(base, opacity);
        return;
    }
    vec3 n = normalize(facing);
    vec3 v = normalize(eye - place);
    if (dot(n, v) < 0.0) {
        n = -n;
    }
    float slant = dot(n, lamp);
    float sun = slant > 0.0 ? slant * sunlit(slant) : 0.0;
    float sky = mix(0.34, 0.62, 0.5 + 0.5 * n.z) * mix(0.3, 1.0, open);
    float fill = 0.16 * max(0.0, dot(n, v));
    vec3 h = normalize(lamp + v);
    float shine = sun > 0.0 ? gloss * pow(max(0.0, dot(n, h)), 48.0) : 0.0;
    vec3 light = sky * vec3(0.94, 0.98, 1.06) + fill + 0.74 * sun * vec3(1.04, 1.0, 0.93);
    light *= mix(0.6, 1.0, open);
    pixel = vec4(toScreen(toLinear(base) * light + 0.5 * shine), opacity);
}
