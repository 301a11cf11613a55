#version 330 core
// Depth seen from the lamp.
layout(location = 0) in vec3 position;
uniform mat4 lightView;
uniform vec2 turn;
uniform vec3 shift;

void main() {
    vec3 p = vec3(turn.x * position.x - turn.y * position.y, turn.y * position.x + turn.x * position.y, position.z) + shift;
    gl_Position = lightView * vec4(p, 1.0);
}
