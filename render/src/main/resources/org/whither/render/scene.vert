#version 330 core
// Places a vertex of a scene: turns it about the shaft, moves it, and projects it for the eye and for the light.
layout(location = 0) in vec3 position;
layout(location = 1) in vec3 normal;
layout(location = 2) in float value;
uniform mat4 view;
uniform mat4 lightView;
uniform vec2 turn; // cosine and sine
uniform vec3 shift;
out vec3 place;
out vec3 facing;
out vec3 lightPlace;
out float number;

vec3 turned(vec3 v) {
    return vec3(turn.x * v.x - turn.y * v.y, turn.y * v.x + turn.x * v.y, v.z);
}

void main() {
    place = turned(position) + shift;
    facing = turned(normal);
    number = value;
    lightPlace = 0.5 + 0.5 * (lightView * vec4(place, 1.0)).xyz;
    gl_Position = view * vec4(place, 1.0);
}
