package org.merewarden.architecture;

import java.util.stream.Stream;
import org.springframework.modulith.core.ApplicationModuleDetectionStrategy;
import org.springframework.modulith.core.JavaPackage;

/**
 * The direct children of the root package are the modules, except that each room of {@code core} is one: the core has
 * no types of its own and is open to the features, but carries no annotation that would say so.
 */
public class CoreRoomsAreModules implements ApplicationModuleDetectionStrategy {
    @Override
    public Stream<JavaPackage> getModuleBasePackages(JavaPackage root) {
        return root.getDirectSubPackages().stream()
                .flatMap(room ->
                        room.getLocalName().equals("core") ? room.getDirectSubPackages().stream() : Stream.of(room));
    }
}
