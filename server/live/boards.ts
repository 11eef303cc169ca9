import 'server-only'
/**
 * Tells readers of boards that one changed. Fed by LISTEN/NOTIFY, which carries ids only; what may be
 * missed while the database was away is read again at each new LISTEN and every ten seconds, and every
 * second once a reading has failed: LISTEN itself may be back long after the database is.
 */
import type { LiveBoardChange } from '@/server/contract/board'

export interface BoardFeedPorts {
  /** Calls `heard` with a class's id for every notification, and `listening` whenever LISTEN stands (again). */
  listen(heard: (scheduledClassId: string) => void, listening: () => void): Promise<void>
  revisions(scheduledClassIds: string[]): Promise<LiveBoardChange[]>
  setTimer(work: () => void, ms: number): unknown
}

type Reader = { boards: ReadonlySet<string>; tell: (change: LiveBoardChange) => void }

/** Many rounds may come in at once; one reading serves them all. */
const GATHER_MS = 150
const FLOOR_MS = 10_000
const RETRY_MS = 1_000

export class BoardFeed {
  private readonly ports: BoardFeedPorts
  private readonly readers = new Set<Reader>()
  private readonly told = new Map<string, number>()
  private readonly changed = new Set<string>()
  private started = false
  private gathering = false

  constructor(ports: BoardFeedPorts) {
    this.ports = ports
  }

  /** Adds a reader of some boards, who is told the present revisions at once. Returns the way to end it. */
  read(boards: readonly string[], tell: (change: LiveBoardChange) => void): () => void {
    const reader: Reader = { boards: new Set(boards), tell }
    this.readers.add(reader)
    this.start()
    void this.ports
      .revisions([...boards])
      .then((changes) => changes.forEach((change) => tell(change)))
      .catch(() => undefined)
    return () => {
      this.readers.delete(reader)
    }
  }

  private start(): void {
    if (this.started) return
    this.started = true
    this.tryListen()
    const floor = () => {
      this.changedAll()
      this.ports.setTimer(floor, FLOOR_MS)
    }
    this.ports.setTimer(floor, FLOOR_MS)
  }

  private tryListen(): void {
    this.ports
      .listen(
        (scheduledClassId) => this.gather([scheduledClassId]),
        () => this.changedAll(),
      )
      .catch(() => this.ports.setTimer(() => this.tryListen(), RETRY_MS))
  }

  private changedAll(): void {
    this.gather([...this.readers].flatMap((reader) => [...reader.boards]))
  }

  private gather(scheduledClassIds: readonly string[]): void {
    for (const id of scheduledClassIds) {
      if ([...this.readers].some((reader) => reader.boards.has(id))) this.changed.add(id)
    }
    if (this.gathering || this.changed.size === 0) return
    this.gathering = true
    this.ports.setTimer(() => {
      const ids = [...this.changed]
      this.changed.clear()
      this.gathering = false
      this.ports.revisions(ids).then(
        (changes) => changes.forEach((change) => this.tellAll(change)),
        () => this.ports.setTimer(() => this.gather(ids), RETRY_MS),
      )
    }, GATHER_MS)
  }

  private tellAll(change: LiveBoardChange): void {
    if (this.told.get(change.scheduledClassId) === change.revision) return
    this.told.set(change.scheduledClassId, change.revision)
    for (const reader of this.readers) {
      if (reader.boards.has(change.scheduledClassId)) reader.tell(change)
    }
  }
}
