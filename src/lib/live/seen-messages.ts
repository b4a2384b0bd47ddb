const MOST_REMEMBERED = 1000;

/** Remembers which messages came: each is sent two ways, and the first to arrive counts. */
export class SeenMessages {
	#ids = new Set<string>();

	/** True the first time an id is given. */
	isNew(id: string): boolean {
		if (this.#ids.has(id)) return false;
		this.#ids.add(id);
		if (this.#ids.size > MOST_REMEMBERED) {
			const [oldest] = this.#ids;
			if (oldest !== undefined) this.#ids.delete(oldest);
		}
		return true;
	}
}
