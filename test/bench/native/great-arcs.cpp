// CPU nanoseconds a joint that GLM's and Eigen's slerp take for poses of 80 joints: keys joint after joint, segment given, float.
// Prints "glm <ns>" and "eigen <ns>", the median of 15 turns of 4 ms or more.
#include <Eigen/Geometry>
#include <algorithm>
#include <cstdio>
#include <ctime>
#include <glm/gtc/quaternion.hpp>
#include <random>
#include <vector>

constexpr int JOINTS = 80, KEYS = 60, POSES = 50;

template <typename Pose> double nanoseconds(Pose pose) {
  std::vector<double> turns;
  for (int turn = 0; turn < 18; turn++) {
    const std::clock_t start = std::clock();
    long runs = 0;
    do {
      pose();
      runs++;
    } while (std::clock() - start < CLOCKS_PER_SEC / 250);
    if (turn >= 3) turns.push_back(1e9 * double(std::clock() - start) / CLOCKS_PER_SEC / (double(runs) * JOINTS * POSES));
  }
  std::sort(turns.begin(), turns.end());
  return turns[turns.size() / 2];
}

int main() {
  std::mt19937 random(20);
  std::normal_distribution<float> normal;
  std::uniform_real_distribution<float> uniform(0, 1);
  std::vector<Eigen::Quaternionf> eigen(JOINTS * KEYS), eigenOut(JOINTS);
  std::vector<glm::quat> glm(JOINTS * KEYS), glmOut(JOINTS);
  for (int joint = 0; joint < JOINTS; joint++) {
    Eigen::Quaternionf q(normal(random), normal(random), normal(random), normal(random));
    q.normalize();
    for (int key = 0; key < KEYS; key++) {
      eigen[key * JOINTS + joint] = q;
      glm[key * JOINTS + joint] = glm::quat(q.w(), q.x(), q.y(), q.z());
      const Eigen::Vector3f axis = Eigen::Vector3f(normal(random), normal(random), normal(random)).normalized();
      // 5 degrees on average.
      q = (q * Eigen::Quaternionf(Eigen::AngleAxisf(0.0872665f * (0.5f + uniform(random)), axis))).normalized();
    }
  }
  std::vector<int> segments(POSES);
  std::vector<float> parts(POSES);
  for (int n = 0; n < POSES; n++) {
    segments[n] = int(uniform(random) * (KEYS - 1.001f));
    parts[n] = uniform(random);
  }
  volatile float sink = 0;
  const double glmTime = nanoseconds([&] {
    for (int n = 0; n < POSES; n++) {
      const glm::quat *from = &glm[segments[n] * JOINTS], *to = from + JOINTS;
      for (int i = 0; i < JOINTS; i++) glmOut[i] = glm::slerp(from[i], to[i], parts[n]);
      sink = sink + glmOut[7].x;
    }
  });
  const double eigenTime = nanoseconds([&] {
    for (int n = 0; n < POSES; n++) {
      const Eigen::Quaternionf *from = &eigen[segments[n] * JOINTS], *to = from + JOINTS;
      for (int i = 0; i < JOINTS; i++) eigenOut[i] = from[i].slerp(parts[n], to[i]);
      sink = sink + eigenOut[7].x();
    }
  });
  std::printf("glm %.3f\neigen %.3f\n", glmTime, eigenTime);
}
